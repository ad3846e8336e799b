import type { SectionResult } from '@/engine/lyapunov/contract';

import { seriesByName, type Json } from './shared';

export function sectionJson(symbols: readonly string[], result: SectionResult): Json {
  return {
    status: result.status,
    message: result.message,
    crossings: result.times.length,
    times: Array.from(result.times),
    states: seriesByName(symbols, result.states, result.times.length),
  };
}
