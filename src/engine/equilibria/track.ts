import type { CompiledSystem } from '../system/contract';
import type { EquilibriaResult, Equilibrium } from './contract';
import { describeEquilibrium, type DescriptionOptions } from './describe';
import { dropState, faceProblem, liftState } from './face-system';
import { makeFace } from './faces';
import { sameState } from './merge';
import { newton } from './newton';
import { NEEDS_PERIOD_MAP } from './search';

/** Newton steps allowed from one slider position to the next. */
const TRACK_ITERATIONS = 25;

/**
 * Follows known equilibria to new parameters by Newton's method from where they were, each on its own
 * face (absent populations stay absent). Those that are lost, become infeasible or run into another
 * are dropped; none is found anew, which the message says. Fast enough for every frame of a slider.
 */
export function trackEquilibria(
  system: CompiledSystem,
  previous: EquilibriaResult,
  p: Float64Array,
  options: DescriptionOptions = {},
): EquilibriaResult {
  if (!system.autonomous)
    return { ...previous, status: 'needs-period-map', message: NEEDS_PERIOD_MAP, equilibria: [] };
  system.setParameters(p);
  const n = system.dimension;
  const scale = Float64Array.from(previous.box, (side) =>
    Math.max(Math.abs(side.from), Math.abs(side.to), Number.MIN_VALUE),
  );
  const kept: Equilibrium[] = [];
  for (const known of previous.equilibria) {
    const absent: number[] = [];
    known.state.forEach((x, i) => {
      if (x === 0 && system.nonnegative[i]) absent.push(i);
    });
    const face = makeFace(system, absent, known.type === 'not differentiable', scale);
    let state: Float64Array = Float64Array.from(known.state);
    let accuracy = 0;
    if (face.free.length > 0) {
      const outcome = newton(faceProblem(system, face, true), dropState(face, known.state), {
        scale: dropState(face, scale),
        maximumIterations: TRACK_ITERATIONS,
      });
      if (outcome.status !== 'converged') continue;
      state = liftState(face, outcome.state, n);
      accuracy = outcome.accuracy;
    }
    if (state.some((x, i) => system.nonnegative[i] && x < 0)) continue;
    if (kept.some((other) => sameState(other.state, state, scale, accuracy))) continue;
    const described = describeEquilibrium(system, state, face, accuracy, scale, options);
    if (described !== null) kept.push(described);
  }
  const lost = previous.equilibria.length - kept.length;
  return {
    ...previous,
    status: 'complete',
    message:
      lost === 0
        ? 'Followed from the equilibria known before; new ones are sought when the slider rests.'
        : `Followed from the equilibria known before; ${lost} went out of sight. New ones are sought when the slider rests.`,
    equilibria: kept,
    startsTried: previous.equilibria.length,
  };
}
