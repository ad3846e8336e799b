import type { CompiledSystem } from '../system/contract';

/** exp below this is no longer a normal number; populations there keep their per capita rate. */
const LOWEST_LOGARITHM = -690;

export interface LogScaledSystem {
  readonly system: CompiledSystem;
  /** Whether each state is integrated as a logarithm. */
  readonly logarithmic: readonly boolean[];
  /** State to integrated variables and back; `out` may be the argument. */
  toScale(u: Float64Array, out: Float64Array): void;
  fromScale(v: Float64Array, out: Float64Array): void;
}

/**
 * The system in v_i = log u_i for each nonnegative state that starts above zero:
 *
 *     dv_i/dt = f_i / u_i,   dg_i/dv_j = (J_ij u_j^[j logarithmic] - [i = j] f_i) / u_i.
 *
 * States that start at zero, and those of any sign, stay as they are. Own derivation (chain rule).
 */
export function logScaleSystem(inner: CompiledSystem, start: Float64Array): LogScaledSystem {
  const n = inner.dimension;
  const logarithmic = Array.from({ length: n }, (_, i) => inner.nonnegative[i] === true && start[i] > 0);
  const u = new Float64Array(n);
  const f = new Float64Array(n);

  const fromScale = (v: Float64Array, out: Float64Array): void => {
    for (let i = 0; i < n; i += 1)
      out[i] = logarithmic[i] ? Math.exp(Math.max(v[i], LOWEST_LOGARITHM)) : v[i];
  };
  const toScale = (state: Float64Array, out: Float64Array): void => {
    for (let i = 0; i < n; i += 1) out[i] = logarithmic[i] ? Math.log(state[i]) : state[i];
  };

  const system: CompiledSystem = {
    dimension: n,
    stateSymbols: inner.stateSymbols,
    parameterKeys: inner.parameterKeys,
    defaults: inner.defaults,
    nonnegative: inner.nonnegative.map((must, i) => must && !logarithmic[i]),
    populations: inner.populations,
    autonomous: inner.autonomous,
    smooth: inner.smooth,
    backend: inner.backend,
    setParameters: (p) => inner.setParameters(p),
    rhs(t, v, out) {
      fromScale(v, u);
      inner.rhs(t, u, out);
      for (let i = 0; i < n; i += 1) if (logarithmic[i]) out[i] /= u[i];
    },
    jacobian(t, v, out) {
      fromScale(v, u);
      inner.rhs(t, u, f);
      inner.jacobian(t, u, out);
      for (let i = 0; i < n; i += 1)
        for (let j = 0; j < n; j += 1) {
          let entry = out[i * n + j] * (logarithmic[j] ? u[j] : 1);
          if (logarithmic[i]) entry = (i === j ? entry - f[i] : entry) / u[i];
          out[i * n + j] = entry;
        }
    },
    parameterDerivative(t, v, k, out) {
      fromScale(v, u);
      inner.parameterDerivative(t, u, k, out);
      for (let i = 0; i < n; i += 1) if (logarithmic[i]) out[i] /= u[i];
    },
    forcingPeriod: () => inner.forcingPeriod(),
    directional() {
      throw new Error('Normal forms are taken of the system itself, never of its logarithms.');
    },
  };
  return { system, logarithmic, toScale, fromScale };
}
