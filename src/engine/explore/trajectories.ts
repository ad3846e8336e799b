import { integrateInSlices } from '../integrators/driver';
import type { IntegrationOptions, Trajectory } from '../integrators/contract';
import type { CompiledModel } from '../system/compile-model';
import type { CompiledSystem } from '../system/contract';
import type { ExploreRequest, SecondOpinion } from './contract';

/** Times of a request: `samples` of them, evenly from 0 to the horizon. */
export function sampleTimes(request: Pick<ExploreRequest, 'horizon' | 'samples'>): Float64Array {
  const count = Math.max(2, Math.floor(request.samples));
  return Float64Array.from({ length: count }, (_, k) => (request.horizon * k) / (count - 1));
}

/** Start of the split model, filled up from the document where the request leaves one out. */
export function startsOf(model: CompiledModel, request: Pick<ExploreRequest, 'starts'>): Float64Array {
  return Float64Array.from(model.starts, (own, i) => request.starts[i] ?? own);
}

/** Trajectory of one system from given starts; a generator that yields between slices of steps. */
export function* trajectoryInSlices(
  system: CompiledSystem,
  p: Float64Array,
  starts: Float64Array,
  times: Float64Array,
  options: IntegrationOptions = {},
): Generator<void, Trajectory> {
  system.setParameters(p);
  const run = integrateInSlices(system, starts, times, options);
  for (;;) {
    const next = run.next();
    if (next.done) return next.value;
    yield;
  }
}

/** Differences beyond this share of the solution's size are worth a warning. */
const AGREEMENT = 1e-4;

/**
 * The trajectory again by the other method, extrapolation, or the stiff one where that spends its
 * budget, and how far both differ.
 */
export function secondOpinion(model: CompiledModel, request: ExploreRequest): SecondOpinion {
  const { system } = model;
  const p = model.valuesToParameters(request.values);
  const starts = startsOf(model, request);
  const times = sampleTimes(request);
  const run = (options: IntegrationOptions): Trajectory => {
    const steps = trajectoryInSlices(system, p, starts, times, options);
    for (;;) {
      const next = steps.next();
      if (next.done) return next.value;
    }
  };
  const first = run({});
  let name = 'extrapolation of the midpoint rule';
  let second = run({ method: 'odex', maximumSteps: SECOND_OPINION_STEPS });
  if (second.status === 'steps-spent') {
    name = 'a stiff method of order 4';
    second = run({ method: 'rodas' });
  }
  const { difference, at } = largestDifference(first, second);
  return { trajectory: second, difference, message: describeAgreement(name, first, second, difference, at) };
}

/** A budget for the other method that keeps a stiff model from holding the worker. */
const SECOND_OPINION_STEPS = 20_000;

/** Largest |a - b| over the times that both reached, relative to the largest value of that state. */
function largestDifference(a: Trajectory, b: Trajectory): { difference: number; at: number } {
  const n = a.dimension;
  const count = Math.min(a.times.length, b.times.length);
  let difference = 0;
  let at = 0;
  for (let i = 0; i < n; i += 1) {
    let size = Number.MIN_VALUE;
    for (let k = 0; k < count; k += 1) size = Math.max(size, Math.abs(a.states[k * n + i]));
    for (let k = 0; k < count; k += 1) {
      const ratio = Math.abs(a.states[k * n + i] - b.states[k * n + i]) / size;
      if (ratio > difference) {
        difference = ratio;
        at = a.times[k];
      }
    }
  }
  return { difference, at };
}

function describeAgreement(
  name: string,
  first: Trajectory,
  second: Trajectory,
  difference: number,
  at: number,
): string {
  const reached = Math.min(first.times[first.times.length - 1], second.times[second.times.length - 1]);
  if (second.status !== first.status) {
    const [who, why] =
      second.status === 'complete'
        ? ['The first method', first.message]
        : [`The other method, ${name},`, second.message];
    return `${who} came only as far as t = ${Number(reached.toPrecision(4))}. ${why}`;
  }
  const share = difference.toExponential(1);
  if (difference <= AGREEMENT)
    return `The other method, ${name}, agrees: the largest difference is ${share} of the size of the solution.`;
  return `The other method, ${name}, differs by up to ${share} of the size of the solution, most at t = ${Number(at.toPrecision(4))}. Where trajectories diverge by nature, as in chaos, late times of neither can be trusted.`;
}
