import type { CompiledSystem } from '../system/contract';
import {
  INTEGRATION_DEFAULTS,
  INTEGRATION_MESSAGES,
  type IntegrationOptions,
  type IntegrationStatus,
  type Trajectory,
} from './contract';
import { Solver } from './odex-package';

/** A step of extrapolation costs up to about a hundred evaluations; so many are a spent budget as well. */
const EVALUATIONS_PER_STEP = 100;

/**
 * The package never notices a number that is not finite, so it is told a slope too steep to accept, and
 * shortens its step. So many of them between two steps mean that there is no way on.
 */
const REPELLENT_SLOPE = 1e100;
const MOST_REPELLED = 2000;

/** `Outcome.Converged` of the package. */
const CONVERGED = 0;

/** Leaves the package's loop. */
class Halt extends Error {
  constructor(readonly status: IntegrationStatus) {
    super(INTEGRATION_MESSAGES[status]);
  }
}

/**
 * Extrapolation of the explicit midpoint rule with variable order and dense output, by the package
 * odex: for trajectories that are kept, and as the opinion of another method.
 * Source: Hairer, Norsett & Wanner I, sect. II.9.
 */
export function integrateByExtrapolation(
  system: CompiledSystem,
  start: Float64Array,
  times: Float64Array,
  options: IntegrationOptions = {},
): Trajectory {
  const n = system.dimension;
  const states = new Float64Array(n * times.length);
  const budget = options.maximumSteps ?? INTEGRATION_DEFAULTS.maximumSteps;
  const end = times[times.length - 1];
  const direction = Math.sign(end - times[0]);
  let evaluations = 0;
  let steps = 0;
  let repelled = 0;
  let filled = 1;
  states.set(start.subarray(0, n));
  while (filled < times.length && times[filled] === times[0]) {
    states.set(start.subarray(0, n), filled * n);
    filled += 1;
  }

  const u = new Float64Array(n);
  const f = new Float64Array(n);
  const derivative = (t: number, y: number[]): number[] => {
    evaluations += 1;
    if (evaluations > budget * EVALUATIONS_PER_STEP) throw new Halt('steps-spent');
    u.set(y);
    system.rhs(t, u, f);
    const out = Array.from(f);
    if (out.every(Number.isFinite)) return out;
    repelled += 1;
    if (repelled > MOST_REPELLED) throw new Halt('not-finite');
    return out.fill(REPELLENT_SLOPE);
  };

  const solver = new Solver(n);
  solver.denseOutput = true;
  solver.maxSteps = budget;
  solver.relativeTolerance = options.relativeTolerance ?? INTEGRATION_DEFAULTS.relativeTolerance;
  solver.absoluteTolerance = options.absoluteTolerance ?? INTEGRATION_DEFAULTS.absoluteTolerance;
  if (options.initialStep) solver.initialStepSize = Math.abs(options.initialStep);

  let status: IntegrationStatus = 'complete';
  let rejected = 0;
  try {
    if (direction !== 0) {
      const result = solver.solve(derivative, times[0], Array.from(start.subarray(0, n)), end, onStep);
      rejected = result.nReject;
      for (let i = 0; i < n; i += 1) u[i] = result.y[i];
      // The last time is the end of the last step itself.
      if (result.outcome === CONVERGED && filled === times.length - 1) {
        states.set(u, filled * n);
        filled += 1;
      }
    }
    if (filled < times.length) status = 'steps-spent';
  } catch (reason) {
    if (!(reason instanceof Halt)) throw reason;
    status = reason.status;
  }

  function onStep(
    _step: number,
    old: number,
    t: number,
    y: number[],
    dense?: (component: number, time: number) => number,
  ): void {
    if (!dense) return;
    steps += 1;
    if (Math.abs(t - old) <= 4 * Number.EPSILON * Math.abs(t))
      throw new Halt(repelled > 0 ? 'not-finite' : 'step-too-small');
    repelled = 0;
    while (filled < times.length && (times[filled] - t) * direction <= 0) {
      const time = times[filled];
      for (let i = 0; i < n; i += 1) states[filled * n + i] = time === t ? y[i] : dense(i, time);
      filled += 1;
    }
  }

  const whole = filled === times.length;
  return {
    status,
    message: INTEGRATION_MESSAGES[status],
    times: whole ? times : times.slice(0, filled),
    states: whole ? states : states.slice(0, filled * n),
    dimension: n,
    evaluations,
    steps,
    rejected,
  };
}
