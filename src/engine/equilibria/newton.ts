import { leastSquaresStep, newtonStep } from './linear-steps';

/**
 * Newton's method for a square system f(u) = 0 with its exact Jacobian:
 *
 *     J(u) d = -f(u),   u <- u + lambda d,
 *
 * lambda halved until the simplified correction J(u)^-1 f(u + lambda d) has become shorter
 * (natural monotonicity test: Deuflhard, Newton Methods for Nonlinear Problems, 2004, sect. 3.3),
 * lengths being measured relative to the size of each state. Where J is singular, as at a fold or
 * on a curve of equilibria, the regularised step (J'J + mu I) d = -J'f with mu = |f|^2 is taken
 * (Yamashita & Fukushima, Computing Suppl. 15, 2001, 239), which still converges there.
 * Roots that are known already can be deflated (Farrell, Birkisson & Funke, SIAM J. Sci. Comput. 37,
 * 2015, A2026): the step is then the Newton step times a scalar.
 *
 * Fails as a value: `not-converged`, `not-finite` or `diverged`, with the last state reached.
 */
export interface NewtonProblem {
  readonly dimension: number;
  residual(u: Float64Array, out: Float64Array): void;
  jacobian(u: Float64Array, out: Float64Array): void;
}

export interface NewtonOptions {
  /** Typical size of each state; a length below it is measured against it. */
  readonly scale: Float64Array;
  readonly relativeTolerance?: number;
  readonly maximumIterations?: number;
  /** Known roots to keep away from. */
  readonly deflate?: readonly Float64Array[];
}

export interface NewtonOutcome {
  readonly status: 'converged' | 'not-converged' | 'not-finite' | 'diverged';
  readonly state: Float64Array;
  /** Largest |f_i| relative to the size of the flows that balance there. */
  readonly residual: number;
  /** Length of the last full correction, relative: how well the root is known. */
  readonly accuracy: number;
  readonly iterations: number;
}

export const NEWTON_DEFAULTS = {
  /** A few units in the last place: quadratic convergence reaches it one step after 1e-7. */
  relativeTolerance: 4e-14,
  maximumIterations: 60,
  /** A residual at rounding level of the flows ends the iteration at singular roots. */
  roundingResidual: 1e-14,
  /** Residual that a root with a singular Jacobian must reach. */
  singularResidual: 1e-10,
  /** States below this share of their typical size are measured against it. */
  floor: 1e-6,
  /** Beyond this multiple of the typical size the iteration is called diverged. */
  divergence: 1e9,
  /** Smallest damping factor tried. */
  smallestDamping: 1 / 1024,
} as const;

/** Length of d relative to the state: the largest |d_i| / max(|u_i|, floor scale_i). */
export function relativeLength(d: Float64Array, u: Float64Array, scale: Float64Array): number {
  let largest = 0;
  for (let i = 0; i < d.length; i += 1) {
    const size = Math.max(Math.abs(u[i]), NEWTON_DEFAULTS.floor * scale[i]);
    const length = Math.abs(d[i]) / size;
    if (!(length <= largest)) largest = length;
  }
  return largest;
}

/**
 * Largest |f_i| over the size of the flows that balance at u. Flows are measured by
 * sum_j |J_ij| |u_j| at u and a tenth below and above it, so that the measure does not vanish
 * with the Jacobian at a fold.
 */
export function relativeResidual(problem: NewtonProblem, u: Float64Array, scale: Float64Array): number {
  const m = problem.dimension;
  const f = new Float64Array(m);
  const J = new Float64Array(m * m);
  const near = new Float64Array(m);
  const flow = new Float64Array(m);
  for (const factor of [1, 0.9, 1.1]) {
    for (let i = 0; i < m; i += 1) near[i] = u[i] * factor;
    problem.jacobian(near, J);
    for (let i = 0; i < m; i += 1) {
      let sum = 0;
      for (let j = 0; j < m; j += 1)
        sum += Math.abs(J[i * m + j]) * Math.max(Math.abs(u[j]), NEWTON_DEFAULTS.floor * scale[j]);
      if (sum > flow[i]) flow[i] = sum;
    }
  }
  problem.residual(u, f);
  let largest = 0;
  for (let i = 0; i < m; i += 1) {
    if (f[i] === 0) continue;
    const ratio = Math.abs(f[i]) / flow[i];
    if (!(ratio <= largest)) largest = ratio;
  }
  return Number.isNaN(largest) ? Infinity : largest;
}

function allFinite(values: Float64Array): boolean {
  for (let i = 0; i < values.length; i += 1) if (!Number.isFinite(values[i])) return false;
  return true;
}

/** Scalar by which deflation lengthens (or turns) the Newton step d at u. */
function deflationFactor(
  u: Float64Array,
  d: Float64Array,
  roots: readonly Float64Array[],
  scale: Float64Array,
): number {
  // M(u) = prod_k (1/|u - r_k|^2 + 1); tau = 1 / (1 - grad M . d / M).
  let change = 0;
  for (const root of roots) {
    let distance = 0;
    let along = 0;
    for (let i = 0; i < u.length; i += 1) {
      const gap = (u[i] - root[i]) / scale[i];
      distance += gap * gap;
      along += (gap * d[i]) / scale[i];
    }
    if (distance === 0) return Number.NaN;
    change += (-2 * along) / (distance * (1 + distance));
  }
  return 1 / (1 - change);
}

/** Finds a root of the problem near `start`; see the top of the file. `start` is not written to. */
export function newton(problem: NewtonProblem, start: Float64Array, options: NewtonOptions): NewtonOutcome {
  const m = problem.dimension;
  const { scale } = options;
  const tolerance = options.relativeTolerance ?? NEWTON_DEFAULTS.relativeTolerance;
  const maximum = options.maximumIterations ?? NEWTON_DEFAULTS.maximumIterations;
  const roots = options.deflate ?? [];
  const u = Float64Array.from(start);
  const f = new Float64Array(m);
  const J = new Float64Array(m * m);
  const next = new Float64Array(m);
  const fNext = new Float64Array(m);
  let previousLength = Infinity;
  let previousRatio = Infinity;
  let length = Infinity;
  const end = (status: NewtonOutcome['status'], iterations: number): NewtonOutcome => ({
    status,
    state: u,
    residual: status === 'not-finite' ? Infinity : relativeResidual(problem, u, scale),
    accuracy: length,
    iterations,
  });

  for (let iteration = 1; iteration <= maximum; iteration += 1) {
    problem.residual(u, f);
    problem.jacobian(u, J);
    if (!allFinite(f) || !allFinite(J)) return end('not-finite', iteration);
    const step = newtonStep(J, f, m);
    const d = step?.direction ?? leastSquaresStep(J, f, m);
    if (!allFinite(d)) return end('not-finite', iteration);
    length = relativeLength(d, u, scale);
    // A regularised step is short wherever J vanishes; it shows a root only together with a small residual.
    if (
      length <= tolerance &&
      (step !== null || relativeResidual(problem, u, scale) <= NEWTON_DEFAULTS.singularResidual)
    ) {
      for (let i = 0; i < m; i += 1) u[i] += d[i];
      return end('converged', iteration);
    }
    if (length > previousLength / 2 && length < 1e-4 && roots.length === 0) {
      // Corrections no longer shrink: rounding has been reached, if the residual says so too.
      if (relativeResidual(problem, u, scale) <= NEWTON_DEFAULTS.roundingResidual)
        return end('converged', iteration);
    }
    const ratio = length / previousLength;
    // At a root of multiplicity k corrections shrink by 1 - 1/k each time: extrapolate (Aitken).
    const linear = length < 0.1 && ratio > 0.3 && Math.abs(ratio - previousRatio) < 0.05;
    previousLength = length;
    previousRatio = linear ? Infinity : ratio;

    let factor = linear ? 1 / (1 - ratio) : 1;
    if (roots.length > 0) {
      factor = deflationFactor(u, d, roots, scale);
      if (!Number.isFinite(factor)) return end('not-converged', iteration);
      // A turned step longer than the state itself says nothing; keep its direction.
      const longest = 10 / length;
      if (Math.abs(factor) > longest && Math.abs(factor) > 1)
        factor = Math.sign(factor) * Math.max(1, longest);
    }
    let accepted = false;
    for (let damping = 1; damping >= NEWTON_DEFAULTS.smallestDamping; damping /= 2) {
      for (let i = 0; i < m; i += 1) next[i] = u[i] + damping * factor * d[i];
      problem.residual(next, fNext);
      if (!allFinite(fNext)) continue;
      if (roots.length > 0 || step === null || linear) {
        accepted = roots.length > 0 || shorter(fNext, f);
      } else {
        accepted = relativeLength(step.solve(fNext), u, scale) <= (1 - damping / 4) * length;
      }
      if (accepted) break;
    }
    if (!accepted) {
      if (relativeResidual(problem, u, scale) <= NEWTON_DEFAULTS.roundingResidual)
        return end('converged', iteration);
      return end('not-converged', iteration);
    }
    u.set(next);
    for (let i = 0; i < m; i += 1)
      if (Math.abs(u[i]) > NEWTON_DEFAULTS.divergence * scale[i]) return end('diverged', iteration);
  }
  return end('not-converged', maximum);
}

function shorter(a: Float64Array, b: Float64Array): boolean {
  let sumA = 0;
  let sumB = 0;
  for (let i = 0; i < a.length; i += 1) {
    sumA += a[i] * a[i];
    sumB += b[i] * b[i];
  }
  return sumA < sumB || sumA === 0;
}
