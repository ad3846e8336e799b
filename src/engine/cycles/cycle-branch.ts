import type { SpecialPoint } from '../continuation/contract';
import type { CycleBranch, CycleOrigin } from './contract';
import type { CycleCurve, CyclePoint } from './cycle-curve';
import { cycleQuantities } from './cycle-extremes';
import { allMultipliers } from './describe-cycle';
import type { AcceptedCycle, CyclesFollowed } from './follow-cycles';
import type { CycleSystem } from './cycle-system';

/** Samples kept of each cycle for drawing: enough for a smooth loop, where the mesh is dense. */
const SAMPLES = 101;

export interface BranchParts {
  readonly origin: CycleOrigin;
  readonly cycles: CycleSystem;
  readonly m: number;
  /** Followed against the arc; empty of all but its end where the branch begins at a point. */
  readonly back: CyclesFollowed | null;
  readonly forth: CyclesFollowed;
  /** Hopf point at the beginning, which is drawn as a cycle of no size. */
  readonly hopf: SpecialPoint | null;
  readonly startMessage: CycleBranch['startEnd'];
}

/** Cycles of both directions in order along the arc, the shared first one once. */
export function cyclesInOrder({ back, forth }: BranchParts): readonly AcceptedCycle[] {
  return back ? [...back.cycles.slice(1).reverse(), ...forth.cycles] : forth.cycles;
}

/** The branch as arrays. */
export function assembleCycleBranch(
  parts: BranchParts,
  sample: (point: CyclePoint) => OrbitSamples,
): CycleBranch {
  const { cycles, origin, hopf, back, forth } = parts;
  const { n, system } = cycles;
  const { names } = cycleQuantities(system);
  const accepted = cyclesInOrder(parts);
  const lead = hopf ? 1 : 0;
  const K = accepted.length + lead;
  const q = names.length;
  const branch: CycleBranch = {
    origin,
    dimension: n,
    parameters: new Float64Array(K),
    periods: new Float64Array(K),
    quantities: names,
    lowest: new Float64Array(K * q),
    highest: new Float64Array(K * q),
    mean: new Float64Array(K * q),
    multipliers: new Float64Array(K * n * 2),
    trivialError: new Float64Array(K),
    attracts: new Uint8Array(K),
    feasible: new Uint8Array(K),
    orbits: new Float64Array(K * SAMPLES * n),
    orbitPhases: new Float64Array(K * SAMPLES),
    orbitSamples: SAMPLES,
    startEnd: back ? back.end : parts.startMessage,
    endEnd: forth.end,
  };
  if (hopf) writeHopf(branch, hopf, cycles);
  accepted.forEach(({ point, extremes }, at) => {
    const k = at + lead;
    branch.parameters[k] = point.orbit.parameter;
    branch.periods[k] = point.period;
    branch.lowest.set(extremes.lowest, k * q);
    branch.highest.set(extremes.highest, k * q);
    branch.mean.set(extremes.mean, k * q);
    allMultipliers(point).forEach(({ re, im }, j) => branch.multipliers.set([re, im], (k * n + j) * 2));
    branch.trivialError[k] = point.floquet.trivial === null ? 0 : Math.abs(point.floquet.trivial - 1);
    branch.attracts[k] = point.attracts;
    branch.feasible[k] = isFeasible(cycles, extremes.lowest) ? 1 : 0;
    const { phases, states } = sample(point);
    branch.orbits.set(states, k * SAMPLES * n);
    branch.orbitPhases.set(phases, k * SAMPLES);
  });
  return branch;
}

export function isFeasible({ system, stateScale }: CycleSystem, lowest: Float64Array): boolean {
  return system.nonnegative.every((needed, i) => !needed || lowest[i] >= -1e-9 * stateScale[i]);
}

/** The Hopf point as the cycle of no size that it is: multipliers exp(lambda_j T) with T = 2 pi / omega. */
function writeHopf(branch: CycleBranch, hopf: SpecialPoint, cycles: CycleSystem): void {
  const { system, n } = cycles;
  const period = (2 * Math.PI) / (hopf.hopf?.omega ?? NaN);
  const { groups } = cycleQuantities(system);
  branch.parameters[0] = hopf.parameter;
  branch.periods[0] = period;
  groups.forEach((group, q) => {
    const value = group.reduce((sum, i) => sum + hopf.state[i], 0);
    branch.lowest[q] = branch.highest[q] = branch.mean[q] = value;
  });
  const omega = hopf.hopf?.omega ?? NaN;
  const pair = [...hopf.eigenvalues]
    .sort((a, b) => distanceToPair(a, omega) - distanceToPair(b, omega))
    .slice(0, 2);
  const rest = hopf.eigenvalues.filter((one) => !pair.includes(one));
  const multipliers = [
    { re: 1, im: 0 },
    { re: 1, im: 0 },
    ...rest.map(({ re, im }) => ({
      re: Math.exp(re * period) * Math.cos(im * period),
      im: Math.exp(re * period) * Math.sin(im * period),
    })),
  ];
  multipliers.slice(0, n).forEach(({ re, im }, j) => branch.multipliers.set([re, im], j * 2));
  branch.attracts[0] = rest.some(({ re }) => re > 0) ? 0 : 2;
  branch.feasible[0] = hopf.feasible ? 1 : 0;
  for (let s = 0; s < SAMPLES; s += 1) {
    branch.orbits.set(hopf.state, s * n);
    branch.orbitPhases[s] = s / (SAMPLES - 1);
  }
}

function distanceToPair({ re, im }: { re: number; im: number }, omega: number): number {
  return Math.hypot(re, Math.abs(im) - omega);
}

export interface OrbitSamples {
  readonly phases: Float64Array;
  readonly states: Float64Array;
}

/** The loop of one cycle at times that are dense where the mesh is. */
export function sampleOrbit(curve: CycleCurve, { orbit }: CyclePoint): OrbitSamples {
  const { cycles, reader } = curve;
  const { n } = cycles;
  const { mesh } = orbit;
  const N = mesh.length - 1;
  const phases = new Float64Array(SAMPLES);
  const states = new Float64Array(SAMPLES * n);
  const w = new Float64Array(n);
  for (let s = 0; s < SAMPLES; s += 1) {
    const place = (N * s) / (SAMPLES - 1);
    const k = Math.min(Math.floor(place), N - 1);
    phases[s] = mesh[k] + (place - k) * (mesh[k + 1] - mesh[k]);
    reader.at(mesh, orbit.values, phases[s], w);
    cycles.toState(w, states.subarray(s * n, (s + 1) * n));
  }
  return { phases, states };
}
