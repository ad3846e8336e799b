import type { Progress } from '../continuation/contract';
import { INTEGRATION_MESSAGES, type IntegrationStatus } from '../integrators/contract';
import type { CompiledSystem } from '../system/contract';
import { batchHalfWidth, batchMeans } from './batch-means';
import type { LyapunovResult } from './contract';
import { kaplanYorkeDimension, readExponents, signsOf, type ExponentEvidence } from './read-exponents';
import { RunRecord } from './run-record';
import { TangentFlow, type TangentOptions } from './tangent-flow';

export interface LyapunovRequest extends Omit<TangentOptions, 'count' | 'logarithms'> {
  readonly startTime?: number;
  /** Time before anything is averaged; displacements turn to their directions in its second half. */
  readonly transient: number;
  /** Time averaged over. */
  readonly horizon: number;
  /** Leading exponents wanted; all when absent. */
  readonly count?: number;
  /** Whether nonnegative states are followed as logarithms; true unless told. */
  readonly logarithms?: boolean;
}

export const LYAPUNOV_DEFAULTS = {
  /** Records of the convergence history. */
  records: 240,
  batches: 24,
  maximumSteps: 2_000_000,
  /** Stretches of time between two yields. */
  stretchesPerSlice: 8,
} as const;

/**
 * Lyapunov exponents, the mean rates at which small displacements from a solution grow:
 *
 *     l_j = lim (1/T) sum log R_jj,   W(t + dt) = Q R after each stretch,
 *
 * from the variational equations with orthonormal displacements (Benettin et al., Meccanica 15 (1980) 9;
 * Shimada & Nagashima, Progress of Theoretical Physics 61 (1979) 1605). Uncertainty by batch means; the sum
 * of all exponents is checked against the mean divergence. Works with explicit time as well. Cost: about
 * m + 1 times that of the solution. A generator; its partial results are those of the time so far.
 *
 * @param start length n. Parameters are those set on the system. Ends early as a value, with the reason.
 */
export function* lyapunovSpectrum(
  system: CompiledSystem,
  start: Float64Array,
  request: LyapunovRequest,
): Generator<Progress<LyapunovResult>, LyapunovResult> {
  const n = system.dimension;
  const m = Math.min(request.count ?? n, n);
  const startTime = request.startTime ?? 0;
  const begin = startTime + request.transient;
  const end = begin + request.horizon;
  const shared = { maximumSteps: LYAPUNOV_DEFAULTS.maximumSteps, ...request };
  const logarithms = request.logarithms ?? true;
  const record = new RunRecord(system, m, begin);
  const answer = (status: IntegrationStatus, state: Float64Array): LyapunovResult =>
    summarise(system, record, status, state, request.horizon);

  const approach = new TangentFlow(system, start, startTime, { ...shared, logarithms, count: 0 });
  const half = startTime + request.transient / 2;
  const come = yield* follow(
    approach,
    half,
    () => progress(approach.time, null),
    () => record.look(approach),
  );
  if (come !== 'complete') return answer(come, approach.state);
  const flow = new TangentFlow(system, approach.state, approach.time, { ...shared, logarithms, count: m });
  const turned = yield* follow(
    flow,
    begin,
    () => progress(flow.time, null),
    () => record.look(flow),
  );
  if (turned !== 'complete') return answer(turned, flow.state);
  for (let k = 1; k <= LYAPUNOV_DEFAULTS.records; k += 1) {
    const until = begin + (request.horizon * k) / LYAPUNOV_DEFAULTS.records;
    const status = yield* follow(
      flow,
      until,
      () => progress(flow.time, answer('cancelled', flow.state)),
      () => record.add(flow),
    );
    if (status !== 'complete') return answer(status, flow.state);
    record.close(flow.time);
  }
  return answer('complete', flow.state);

  function progress(time: number, partial: LyapunovResult | null): Progress<LyapunovResult> {
    const fraction = (time - startTime) / (end - startTime);
    return { fraction, stage: 'Averaging the growth of displacements', partial };
  }
}

/** Advances a flow to a time, stretch after stretch. */
function* follow<Report>(
  flow: TangentFlow,
  until: number,
  report: () => Report,
  note: () => void,
): Generator<Report, IntegrationStatus> {
  let stretches = 0;
  while (flow.time < until) {
    const run = flow.advance(until);
    let step = run.next();
    while (!step.done) {
      yield report();
      step = run.next();
    }
    if (step.value !== 'complete') return step.value;
    note();
    stretches += 1;
    if (stretches % LYAPUNOV_DEFAULTS.stretchesPerSlice === 0) yield report();
  }
  return 'complete';
}

function summarise(
  system: CompiledSystem,
  record: RunRecord,
  status: IntegrationStatus,
  state: Float64Array,
  horizon: number,
): LyapunovResult {
  const { m, times, from } = record;
  const span = (times.at(-1) ?? from) - from;
  const order = Array.from({ length: m }, (_, j) => j);
  const mean = order.map((j) => record.mean(j));
  order.sort((a, b) => mean[b] - mean[a]);
  const exponents = Float64Array.from(order, (j) => mean[j]);
  const uncertainty = Float64Array.from(order, (j) =>
    batchHalfWidth(batchMeans(times, record.integrals(j), from, LYAPUNOV_DEFAULTS.batches)),
  );
  const known = span > 0;
  const all = m === system.dimension;
  const evidence: ExponentEvidence = {
    exponents,
    uncertainty,
    all,
    meanRate: known ? record.meanDivergence() / system.dimension : 0,
    span,
    forced: !system.autonomous,
    moves: record.moves(),
    fading: record.fading(),
  };
  return {
    status,
    message:
      status === 'complete'
        ? `Averaged over ${horizon} time units in ${LYAPUNOV_DEFAULTS.records} parts.`
        : `${INTEGRATION_MESSAGES[status]} Averaged over ${Number(span.toPrecision(4))} of ${horizon} time units.`,
    exponents,
    uncertainty,
    traceError:
      all && known ? exponents.reduce((sum, one) => sum + one, 0) - record.meanDivergence() : Number.NaN,
    dimension: known ? kaplanYorkeDimension(exponents, signsOf(evidence)) : null,
    reading: known ? readExponents(evidence) : 'undecided: nothing was averaged yet',
    times: Float64Array.from(times),
    running: record.running(order),
    finalState: state.slice(),
  };
}
