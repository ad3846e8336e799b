import type { LyapunovResult } from '@/engine/lyapunov/contract';

import { byName, rows, type Json } from './shared';

export function lyapunovJson(symbols: readonly string[], result: LyapunovResult): Json {
  return {
    status: result.status,
    message: result.message,
    exponents: Array.from(result.exponents),
    uncertainty: Array.from(result.uncertainty),
    traceError: result.traceError,
    dimension: result.dimension,
    reading: result.reading,
    finalState: byName(symbols, result.finalState),
    running: {
      times: Array.from(result.times),
      exponents: rows(result.running, result.exponents.length),
    },
  };
}
