import type { ExtremesResult, ExtremesSweep } from '@/engine/lyapunov/contract';

import { flags, seriesByName, type Json } from './shared';

export function extremesJson(result: ExtremesResult): Json {
  return {
    status: result.status,
    message: result.message,
    observed: result.observed,
    hysteresis: result.hysteresis,
    sweeps: result.sweeps.map(directionJson),
  };
}

function directionJson(sweep: ExtremesSweep): Json {
  const count = sweep.parameters.length;
  return {
    direction: sweep.direction,
    parameters: Array.from(sweep.parameters),
    lowest: seriesByName(sweep.quantities, sweep.lowest, count),
    highest: seriesByName(sweep.quantities, sweep.highest, count),
    maxima: Array.from({ length: count }, (_, k) =>
      Array.from(sweep.maxima.subarray(sweep.maximaStart[k], sweep.maximaStart[k + 1])),
    ),
    settled: flags(sweep.settled),
  };
}
