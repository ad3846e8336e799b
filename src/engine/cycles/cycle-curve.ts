import { Collocation } from './collocation';
import type { Direction } from './collocation-borders';
import { createBasis, type CollocationBasis } from './collocation-basis';
import type { CycleSystem } from './cycle-system';
import { floquetMultipliers, withDivergence, type FloquetMultipliers } from './floquet';
import { adaptMesh } from './mesh';
import { intervalsOf, onMesh, OrbitReader, type Orbit } from './orbit';

export const CYCLE_NEWTON_DEFAULTS = {
  iterations: 9,
  /** A step of this size leaves an error far below rounding of the collocation. */
  tolerance: 1e-9,
  /** Rounding sets the floor for stiff cycles: a step that no longer shrinks is taken below this. */
  accepted: 1e-6,
  /** A first step beyond this leads elsewhere. */
  leap: 3,
} as const;

/** Multipliers within this of the unit circle are not decided. */
const UNDECIDED = 1e-6;

/** ln of a contraction that collocation at Gauss points still hands on in full. */
const MOST_CONTRACTION = 20;

/** One accepted cycle of a branch. */
export interface CyclePoint {
  readonly orbit: Orbit;
  readonly tangent: Direction;
  readonly period: number;
  readonly floquet: FloquetMultipliers;
  /** Nontrivial multipliers outside the unit circle; real ones above 1; real ones below -1. */
  readonly outside: number;
  readonly above: number;
  readonly below: number;
  readonly attracts: 0 | 1 | 2;
  readonly iterations: number;
  /** Determinant of the corrector's matrix: changes sign where another branch crosses. */
  readonly determinant: { readonly sign: number; readonly log: number };
  /** How far the discretisation is from what must hold exactly: see `resolutionError`. */
  readonly resolution: number;
}

/** Corrector, tangents and multipliers of cycles on meshes of one size. */
export class CycleCurve {
  readonly basis: CollocationBasis;
  readonly reader: OrbitReader;
  private readonly collocation: Collocation;
  private readonly step: Direction;
  private readonly flow: Float64Array;

  constructor(
    readonly cycles: CycleSystem,
    readonly N: number,
    readonly m: number,
  ) {
    this.basis = createBasis(m);
    this.reader = new OrbitReader(m, cycles.n);
    this.collocation = new Collocation(cycles, this.basis, N);
    this.step = this.collocation.newDirection();
    this.flow = new Float64Array(N * cycles.n);
  }

  newDirection(): Direction {
    return this.collocation.newDirection();
  }

  /** The direction of the parameter alone: a corrector along it holds the parameter. */
  parameterDirection(): Direction {
    const direction = this.newDirection();
    direction.parameter = 1;
    return direction;
  }

  /** The direction of the period alone: a corrector along it holds the period. */
  periodDirection(): Direction {
    const direction = this.newDirection();
    direction.logPeriod = 1;
    return direction;
  }

  inner(mesh: Float64Array, a: Direction, b: Direction): number {
    return this.collocation.inner2(mesh, a, b);
  }

  normalise(mesh: Float64Array, direction: Direction): boolean {
    return this.collocation.normalise(mesh, direction);
  }

  moved(from: Orbit, along: Direction, s: number): Orbit {
    const values = new Float64Array(from.values.length);
    for (let k = 0; k < values.length; k += 1) values[k] = from.values[k] + s * along.values[k];
    return {
      mesh: from.mesh,
      values,
      logPeriod: from.logPeriod + s * along.logPeriod,
      parameter: from.parameter + s * along.parameter * this.cycles.parameterScale,
    };
  }

  /**
   * The cycle at distance s from `from` across the direction `along`, by Newton's method; null where it
   * does not converge or values are not finite.
   *
   * @param reference orbit of the phase condition; `from` unless told
   */
  correct(from: Orbit, along: Direction, s: number, reference: Orbit = from): CyclePoint | null {
    const { collocation, step } = this;
    const constraint = { along, target: s, from };
    let orbit = this.moved(from, along, s);
    let before = Infinity;
    for (let k = 1; k <= CYCLE_NEWTON_DEFAULTS.iterations; k += 1) {
      const residual = collocation.linearise(orbit, reference, constraint);
      if (!Number.isFinite(residual) || !collocation.newtonStep(step)) return null;
      const size = largestEntry(step);
      if (!(size < CYCLE_NEWTON_DEFAULTS.leap) || (k > 3 && size > 2 * before)) return null;
      orbit = this.moved(orbit, step, 1);
      const floor = size < CYCLE_NEWTON_DEFAULTS.accepted && size > before / 2;
      if (size < CYCLE_NEWTON_DEFAULTS.tolerance || floor) return this.pointAt(orbit, k);
      before = size;
    }
    return null;
  }

  /** The same cycle on a mesh of this curve's size that suits it; the point may come from another size. */
  adapt(point: CyclePoint): CyclePoint | null {
    const { orbit, tangent } = point;
    const { n } = this.cycles;
    const mesh = adaptMesh(this.basis, n, orbit, this.N);
    const moved: Orbit = { ...orbit, mesh, values: onMesh(this.basis, n, orbit.mesh, orbit.values, mesh) };
    const along: Direction = {
      ...tangent,
      values: onMesh(this.basis, n, orbit.mesh, tangent.values, mesh),
    };
    return this.normalise(mesh, along) ? this.correct(moved, along, 0) : null;
  }

  /** Second direction at a branch point that was corrected last; null where there is none. */
  secondDirection(point: CyclePoint): Direction | null {
    const constraint = { along: point.tangent, target: 0, from: point.orbit };
    const { collocation } = this;
    if (!Number.isFinite(collocation.linearise(point.orbit, point.orbit, constraint))) return null;
    const out = this.newDirection();
    return collocation.secondDirection(point.orbit.mesh, out) ? out : null;
  }

  /** Map across the whole period, n*n, and the way a vector is carried along the nodes by the linearised flow. */
  monodromy(point: CyclePoint): Float64Array | null {
    const { collocation, cycles, N } = this;
    const { n } = cycles;
    const constraint = { along: point.tangent, target: 0, from: point.orbit };
    if (!Number.isFinite(collocation.linearise(point.orbit, point.orbit, constraint))) return null;
    const stride = n + collocation.extras + 1;
    let product = new Float64Array(n * n);
    for (let i = 0; i < n; i += 1) product[i * n + i] = 1;
    for (let k = 0; k < N; k += 1) {
      const next = new Float64Array(n * n);
      for (let i = 0; i < n; i += 1)
        for (let j = 0; j < n; j += 1)
          for (let l = 0; l < n; l += 1)
            next[i * n + j] += collocation.transfer[(k * n + i) * stride + l] * product[l * n + j];
      product = next;
    }
    return product;
  }

  carry(start: Float64Array): Float64Array {
    const out = this.newDirection().values;
    this.collocation.carry(start, out);
    return out;
  }

  /** Reads tangent and multipliers off the last linearisation, which was at this orbit but for rounding. */
  private pointAt(orbit: Orbit, iterations: number): CyclePoint | null {
    const { collocation, cycles } = this;
    const tangent = collocation.newDirection();
    if (!collocation.tangent(orbit.mesh, tangent)) return null;
    const period = collocation.periodOf(orbit);
    const { n } = cycles;
    const stride = n + collocation.extras + 1;
    const flow = cycles.forced ? null : this.flowAt(orbit);
    const found = floquetMultipliers(collocation.transfer, stride, this.N, n, flow);
    const floquet = withDivergence(found, collocation.divergence);
    const outside = floquet.logModuli.filter((log) => log > 0).length;
    const decided = floquet.logModuli.every((log) => Math.abs(log) > UNDECIDED);
    const clearly = floquet.logModuli.some((log) => log > UNDECIDED);
    return {
      orbit,
      tangent,
      period,
      floquet,
      outside,
      above: floquet.nontrivial.filter(({ re, im }) => im === 0 && re > 1).length,
      below: floquet.nontrivial.filter(({ re, im }) => im === 0 && re < -1).length,
      attracts: clearly ? 0 : decided ? 1 : 2,
      iterations,
      determinant: collocation.determinant,
      resolution: resolutionError(found, collocation.divergence),
    };
  }

  private flowAt(orbit: Orbit): Float64Array {
    const { cycles, flow, m } = this;
    const { n } = cycles;
    for (let k = 0; k < intervalsOf(orbit); k += 1)
      cycles.rhs(0, orbit.values.subarray(k * m * n, (k * m + 1) * n), flow.subarray(k * n, (k + 1) * n));
    return flow;
  }
}

/**
 * |trivial multiplier - 1| of a cycle. A forced model has none: there the product of the multipliers is held
 * against exp of the integrated divergence, unless so much contraction is beyond what collocation hands on.
 */
function resolutionError({ trivial, logModuli }: FloquetMultipliers, divergence: number): number {
  if (trivial !== null) return Math.abs(trivial - 1);
  if (!(Math.abs(divergence) < MOST_CONTRACTION)) return 0;
  return Math.abs(logModuli.reduce((sum, log) => sum + log, 0) - divergence);
}

function largestEntry(step: Direction): number {
  let largest = Math.max(Math.abs(step.parameter), Math.abs(step.logPeriod));
  for (let k = 0; k < step.values.length; k += 1) largest = Math.max(largest, Math.abs(step.values[k]));
  return largest;
}
