import type { Eigenvalue } from '../equilibria/contract';
import type { CompiledSystem } from '../system/contract';
import type { HopfForm, SpecialPoint, SpecialPointKind } from './contract';
import { leftNullVector, nullVector } from '../linalg/null-vector';
import { foldForm } from './fold-normal-form';
import { firstLyapunovCoefficient } from './hopf-normal-form';
import { kinkNear } from './kink-near';
import { pointAlong } from './locate';
import type { BranchPoint, Monitor } from './test-functions';

/** |l1| times the squared scale of the states below this is not told from zero. */
const DEGENERATE = 1e-9;
/** An eigenvector counts as leaving the face when an absent state has this share of it. */
const OUTSIDE = 1e-6;

/**
 * Frequency, criticality and speed of crossing at a point where a pair of eigenvalues is imaginary.
 * Null where the pair belongs to absent populations, so that no feasible cycle can begin.
 */
export function describeHopf(monitor: Monitor, at: BranchPoint): HopfForm | null {
  const { curve } = monitor;
  if (!curve.evaluate(at.w) || !monitor.spectrum.update(curve.jacobian)) return null;
  const { im: omega } = monitor.spectrum.nearestPair();
  if (!(omega > 0)) return null;
  if (pairIsOutside(monitor, omega)) return null;
  const crossingSpeed = speedOfCrossing(monitor, at);
  curve.evaluate(at.w);
  if (kinkNear(curve.system, at.u, curve.active, curve.stateScale)) {
    return {
      omega,
      l1: null,
      criticality: 'withheld',
      crossingSpeed,
      meaning: `Cycles of period near ${digits((2 * Math.PI) / omega)} begin here; whether they attract is withheld, because the model has a kink here (min, max, abs or a conditional) and no third derivative.`,
    };
  }
  const l1 = firstLyapunovCoefficient(curve.system, at.u, curve.jacobian, curve.active, omega);
  const period = digits((2 * Math.PI) / omega);
  if (!Number.isFinite(l1) || isDegenerate(l1, monitor)) {
    return {
      omega,
      l1: Number.isFinite(l1) ? l1 : null,
      criticality: 'degenerate',
      crossingSpeed,
      meaning: `The equilibrium turns here with a period near ${period}, but the first Lyapunov coefficient is not told from zero, so that nothing can be said of small cycles.`,
    };
  }
  const criticality = l1 < 0 ? 'supercritical' : 'subcritical';
  const meaning = repelsOtherwise(monitor, at, omega) ? REPELS_OTHERWISE[criticality] : MEANING[criticality];
  return { omega, l1, criticality, crossingSpeed, meaning: meaning(period) };
}

type Sentence = Readonly<Record<'supercritical' | 'subcritical', (period: string) => string>>;

const MEANING: Sentence = {
  supercritical: (period) =>
    `Supercritical: small attracting cycles of period near ${period} grow smoothly from the equilibrium where it begins to repel.`,
  subcritical: (period) =>
    `Subcritical: small repelling cycles of period near ${period} surround the equilibrium while it still attracts; past this point the run jumps away.`,
};

/** Where another eigenvalue grows on both sides, the pair does not decide what attracts. */
const REPELS_OTHERWISE: Sentence = {
  supercritical: (period) =>
    `Supercritical: small cycles of period near ${period} grow smoothly from the equilibrium, but it repels in another direction on both sides of this point, and so do they.`,
  subcritical: (period) =>
    `Subcritical: small repelling cycles of period near ${period} surround the equilibrium, which repels in another direction on both sides of this point.`,
};

/** Whether an eigenvalue besides the imaginary pair grows, absent populations included. */
export function growsBesidesPair(eigenvalues: readonly Eigenvalue[], omega: number): boolean {
  const share = OUTSIDE * omega;
  return eigenvalues.some(({ re, im }) => re > share && !(Math.abs(Math.abs(im) - omega) < share));
}

function repelsOtherwise(monitor: Monitor, at: BranchPoint, omega: number): boolean {
  const { curve, spectrum } = monitor;
  return curve.evaluate(at.w) && spectrum.update(curve.jacobian) && growsBesidesPair(spectrum.list(), omega);
}

/** l1 has the dimension of 1/state²; compared with the scale of the states it is told from zero or not. */
function isDegenerate(l1: number, monitor: Monitor): boolean {
  const largest = Math.max(...monitor.curve.active.map((i) => monitor.curve.stateScale[i]));
  return Math.abs(l1) * largest * largest < DEGENERATE;
}

/** Whether the imaginary pair is missing from the Jacobian of the present states alone. */
function pairIsOutside(monitor: Monitor, omega: number): boolean {
  const { curve } = monitor;
  const { n, m, active } = curve;
  if (m === n) return false;
  const inner = new Float64Array(n * n);
  // Absent states are given eigenvalue 1, which is never imaginary.
  for (let i = 0; i < n; i += 1) inner[i * n + i] = 1;
  for (const i of active) for (const j of active) inner[i * n + j] = curve.jacobian[i * n + j];
  if (!monitor.spectrum.update(inner)) return true;
  const pair = monitor.spectrum.nearestPair();
  return !(Math.abs(pair.im - omega) < OUTSIDE * omega && Math.abs(pair.re) < OUTSIDE * omega);
}

const SIDE_STEP = 1e-4;

/** d Re / d parameter of the pair, by a central difference along the branch. */
function speedOfCrossing(monitor: Monitor, at: BranchPoint): number {
  const values = [SIDE_STEP, -SIDE_STEP].map((s) => {
    const point = pointAlong(monitor, at, s);
    if (
      point === null ||
      !monitor.curve.evaluate(point.w) ||
      !monitor.spectrum.update(monitor.curve.jacobian)
    )
      return null;
    return { parameter: point.parameter, re: monitor.spectrum.nearestPair().re };
  });
  const [ahead, behind] = values;
  if (!ahead || !behind || ahead.parameter === behind.parameter) return NaN;
  return (ahead.re - behind.re) / (ahead.parameter - behind.parameter);
}

export interface PointInput {
  readonly kind: SpecialPointKind;
  readonly at: BranchPoint;
  readonly branch: number;
  readonly index: number;
  readonly accuracy: number;
  readonly hopf?: HopfForm | null;
  readonly invades?: readonly string[];
  readonly label: string;
}

export function makeSpecialPoint(monitor: Monitor, system: CompiledSystem, input: PointInput): SpecialPoint {
  const { at, kind } = input;
  monitor.curve.evaluate(at.w);
  monitor.spectrum.update(monitor.curve.jacobian);
  return {
    id: '',
    kind,
    parameter: at.parameter,
    state: at.u.slice(),
    eigenvalues: monitor.spectrum.list(),
    branch: input.branch,
    index: input.index,
    accuracy: Math.max(input.accuracy, Number.EPSILON),
    feasible: system.nonnegative.every(
      (needed, i) => !needed || at.u[i] >= -1e-7 * monitor.curve.stateScale[i],
    ),
    hopf: input.hopf ?? null,
    foldCoefficient: kind === 'fold' ? foldCoefficient(monitor, at) : null,
    invades: input.invades ?? [],
    meaning: input.hopf?.meaning ?? meaningOf(kind, input.invades ?? [], input.label),
  };
}

/** Of the last evaluated point; null at a kink, and where the two null vectors are orthogonal. */
function foldCoefficient({ curve }: Monitor, at: BranchPoint): number | null {
  const { active, stateScale, system, jacobian, n, m } = curve;
  if (kinkNear(system, at.u, active, stateScale)) return null;
  const scaled = new Float64Array(m * m);
  active.forEach((i, a) =>
    active.forEach((j, b) => (scaled[a * m + b] = (jacobian[i * n + j] * stateScale[j]) / stateScale[i])),
  );
  const v = nullVector(scaled, m).vector.map((value, a) => value * stateScale[active[a]]);
  const w = leftNullVector(scaled, m).vector.map((value, a) => value / stateScale[active[a]]);
  const { numerator, denominator } = foldForm(system, at.u, active, v, w);
  return denominator === 0 || !Number.isFinite(numerator) ? null : numerator / denominator;
}

/** The same transcritical point with other invaders. */
export function withInvaders(point: SpecialPoint, invades: readonly string[]): SpecialPoint {
  return { ...point, invades, meaning: meaningOf(point.kind, invades, '') };
}

function meaningOf(kind: SpecialPointKind, invades: readonly string[], label: string): string {
  switch (kind) {
    case 'fold':
      return `Two equilibria meet and vanish here as ${label} moves on; what rested on the branch is lost, and the way back is not the way there.`;
    case 'transcritical':
      return invades.length > 0
        ? `${invades.join(' and ')} can invade on one side of this point and not on the other.`
        : 'Two branches cross here and exchange their stability.';
    case 'pitchfork':
      return 'Two branches that mirror each other leave the one at hand here.';
    case 'branch point':
      return 'Branches meet here; of which sort the meeting is could not be told.';
    case 'neutral saddle':
      return 'Two real eigenvalues sum to zero here; no cycle begins.';
    case 'Hopf':
      return 'A pair of eigenvalues crosses the imaginary axis here.';
  }
}

function digits(value: number): string {
  return Number(value.toPrecision(4)).toString();
}
