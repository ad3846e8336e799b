import type { CompiledSystem, StatePopulation } from '../system/contract';
import { centreProven, type MotionConstant } from './centre-proven';
import { classify, eigenvalueList, type Classification } from './classify';
import { compositionJacobian } from './composition';
import type { Eigenvalue, Equilibrium, Invasion } from './contract';
import { curveThrough } from './curve-through';
import { differentiabilityAt } from './differentiability';
import { faceProblem, wholeSpace, type Face } from './face-system';
import { invasionOf, jointInvasion } from './invasion';
import { dropState } from './face-system';
import { relativeResidual } from './newton';
import { jacobianUncertainty, spectrumOf, type Spectrum } from './spectrum';

export interface DescriptionOptions {
  /**
   * Constants of motion proven at these parameters; none unless told. Asked only where eigenvalues
   * cannot be told from the imaginary axis, since proving them costs.
   */
  readonly constantsOfMotion?: () => readonly MotionConstant[];
  /** For a split model at spread 0: report the modes in which only composition changes. */
  readonly compositionModes?: boolean;
}

/** States below minus this share of their scale make an equilibrium infeasible. */
const FEASIBLE_SHARE = 1e-9;

/**
 * All that is said of an equilibrium: type, eigenvalues, feasibility, invasions. `system` must hold
 * its parameters. Null where u is no equilibrium at all.
 *
 * @param accuracy how well u is known, relative to each state
 * @param scale typical size of each state
 */
export function describeEquilibrium(
  system: CompiledSystem,
  u: Float64Array,
  face: Face | null,
  accuracy: number,
  scale: Float64Array,
  options: DescriptionOptions,
): Equilibrium | null {
  const n = system.dimension;
  const seenFrom = face ?? wholeSpace(system);
  const residual =
    seenFrom.free.length === 0
      ? 0
      : relativeResidual(
          faceProblem(system, seenFrom, false),
          dropState(seenFrom, u),
          dropState(seenFrom, scale),
        );
  if (!Number.isFinite(residual)) return null;
  const J = new Float64Array(n * n);
  system.jacobian(0, u, J);
  const uncertainty = jacobianUncertainty(system, u, J, accuracy, scale);
  const absent = system.populations.filter(({ states }) =>
    states.every((i) => system.nonnegative[i] && u[i] === 0),
  );
  const invasions = absent.map((one) => invasionOf(system, one, u, J, scale, uncertainty));
  const atKink = kinkAt(
    system,
    u,
    absent.flatMap((one) => [...one.states]),
    scale,
  );
  if (atKink !== null && absent.length > 1) invasions.push(jointInvasion(system, absent, u));
  const spectrum = atKink === null ? spectrumOf(J, n, uncertainty) : null;
  const classification =
    spectrum === null
      ? withoutDerivative(system, invasions, absent, atKink)
      : classify(spectrum, {
          provesNeutral: (re, im) => centreProven(options.constantsOfMotion?.() ?? [], u, J, re, im),
          isOnCurve: () => curveThrough(system, u, wholeSpace(system), J, scale),
        });
  return {
    state: u,
    residual,
    eigenvalues: spectrum === null ? [] : eigenvalueList(spectrum),
    type: classification.type,
    attracts: classification.attracts,
    margin: spectrum === null ? null : -spectrum.re[0],
    feasible: u.every((x, i) => !system.nonnegative[i] || x >= -FEASIBLE_SHARE * scale[i]),
    absent: absent.map((one) => one.symbol),
    invasions,
    compositionModes: options.compositionModes && spectrum !== null ? compositionModes(system, J) : [],
    notes: [...classification.notes, ...accuracyNotes(accuracy, spectrum)],
  };
}

/** Why there is no derivative at u, null where there is one. Asked only where one may be missing. */
function kinkAt(
  system: CompiledSystem,
  u: Float64Array,
  absent: readonly number[],
  scale: Float64Array,
): string | null {
  if (absent.length > 0) {
    const there = differentiabilityAt(system, u, absent, scale);
    if (!there.differentiable) return there.reason;
  }
  if (system.smooth) return null;
  const local = scale.map((size, i) => (u[i] === 0 ? size : Math.abs(u[i])));
  const all = Array.from({ length: system.dimension }, (_, i) => i);
  const there = differentiabilityAt(system, u, all, local);
  return there.differentiable ? null : there.reason;
}

function withoutDerivative(
  system: CompiledSystem,
  invasions: readonly Invasion[],
  absent: readonly StatePopulation[],
  reason: string | null,
): Classification {
  const grows = invasions.some((one) => one.answer === 'can invade');
  const allDecline =
    absent.length === system.populations.length && invasions.every((one) => one.answer === 'cannot invade');
  return {
    type: 'not differentiable',
    attracts: grows ? 'no' : allDecline ? 'yes' : 'unknown',
    notes: [
      `No Jacobian here: ${reason ?? 'the eigenvalues could not be found'}. Eigenvalues have no meaning at this state.`,
    ],
  };
}

function compositionModes(system: CompiledSystem, J: Float64Array): Eigenvalue[] {
  const composition = compositionJacobian(system, J);
  if (composition === null || composition.size === 0) return [];
  const spectrum = spectrumOf(composition.matrix, composition.size, 0);
  return spectrum === null ? [] : eigenvalueList(spectrum);
}

/** States known worse than this are remarked upon. */
const POOR_ACCURACY = 1e-9;

function accuracyNotes(accuracy: number, spectrum: Spectrum | null): string[] {
  if (accuracy <= POOR_ACCURACY || spectrum === null) return [];
  return [`The state is known to about ${accuracy.toExponential(1)} of its size, as near a fold.`];
}
