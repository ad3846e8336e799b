import { logScaleSystem } from '../integrators/log-scale';
import type { CompiledSystem } from '../system/contract';

/** A system together with m small displacements from its solution, as one system of first order. */
export interface VariationalSystem {
  /** Of dimension n + n m + 1: the state (or its logarithm), the displacements one after another, the integral of the divergence. */
  readonly system: CompiledSystem;
  /** Displacements are stored times this, so that one absolute tolerance suits them and the state. */
  readonly weight: number;
  /** Writes the state and the displacements (m columns of length n) to `out`; the integral starts at zero. */
  pack(u: Float64Array, displacements: Float64Array, out: Float64Array): void;
  /** Reads the state and the displacements; returns the integral of the divergence. */
  unpack(y: Float64Array, u: Float64Array, displacements: Float64Array): number;
}

export interface VariationalOptions {
  /** Displacements m, 0 to n. */
  readonly count: number;
  readonly relativeTolerance: number;
  readonly absoluteTolerance: number;
  /** Whether nonnegative states are integrated as logarithms: accurate however small they become. */
  readonly logarithms: boolean;
}

/**
 * The variational equations beside the system:
 *
 *     u' = f(t, u),   w_j' = J(t, u) w_j  (j = 1 ... m),   d' = trace J(t, u).
 *
 * States kept as logarithms v = log u obey v' = f/u; the displacements stay those of u itself, since
 * those of log u do not decline with a population that dies out. Source of the equations: Benettin,
 * Galgani, Giorgilli & Strelcyn, Meccanica 15 (1980) 9, part 2 (from memory).
 *
 * @param start decides which states can be logarithms: those that must stay nonnegative and start above zero
 */
export function variationalSystem(
  inner: CompiledSystem,
  start: Float64Array,
  options: VariationalOptions,
): VariationalSystem {
  const n = inner.dimension;
  const m = options.count;
  const size = n + n * m + 1;
  const weight = options.absoluteTolerance / options.relativeTolerance;
  const scaled = options.logarithms ? logScaleSystem(inner, start) : null;
  const base = scaled?.system ?? inner;
  const u = new Float64Array(n);
  const slope = new Float64Array(n);
  const J = new Float64Array(n * n);

  const stateOf = (y: Float64Array): void => {
    for (let i = 0; i < n; i += 1) slope[i] = y[i];
    if (scaled) scaled.fromScale(slope, u);
    else u.set(slope);
  };
  const refuse = (): never => {
    throw new Error('The variational equations are integrated by explicit methods alone.');
  };
  const system: CompiledSystem = {
    dimension: size,
    stateSymbols: Array.from({ length: size }, (_, k) => inner.stateSymbols[k] ?? `w${k - n}`),
    parameterKeys: inner.parameterKeys,
    defaults: inner.defaults,
    nonnegative: new Array<boolean>(size).fill(false),
    populations: [],
    autonomous: inner.autonomous,
    smooth: inner.smooth,
    backend: inner.backend,
    setParameters: (p) => inner.setParameters(p),
    rhs(t, y, out) {
      stateOf(y);
      inner.jacobian(t, u, J);
      for (let j = 0; j < m; j += 1) {
        const at = n + j * n;
        for (let i = 0; i < n; i += 1) {
          let sum = 0;
          for (let k = 0; k < n; k += 1) sum += J[i * n + k] * y[at + k];
          out[at + i] = sum;
        }
      }
      let trace = 0;
      for (let i = 0; i < n; i += 1) trace += J[i * n + i];
      out[size - 1] = weight * trace;
      if (scaled) for (let i = 0; i < n; i += 1) u[i] = y[i];
      base.rhs(t, u, slope);
      for (let i = 0; i < n; i += 1) out[i] = slope[i];
    },
    jacobian: refuse,
    parameterDerivative: refuse,
    directional: refuse,
    forcingPeriod: () => inner.forcingPeriod(),
  };
  return {
    system,
    weight,
    pack(state, displacements, out) {
      if (scaled) scaled.toScale(state, slope);
      else slope.set(state.subarray(0, n));
      out.set(slope);
      for (let k = 0; k < n * m; k += 1) out[n + k] = weight * displacements[k];
      out[size - 1] = 0;
    },
    unpack(y, state, displacements) {
      stateOf(y);
      state.set(u);
      for (let k = 0; k < n * m; k += 1) displacements[k] = y[n + k] / weight;
      return y[size - 1] / weight;
    },
  };
}
