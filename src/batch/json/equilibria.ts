import type { EquilibriaResult } from '@/engine/equilibria/contract';

import { byName, type Json } from './shared';

export function equilibriaJson(symbols: readonly string[], result: EquilibriaResult): Json {
  return {
    status: result.status,
    message: result.message,
    box: Object.fromEntries(symbols.map((symbol, i) => [symbol, [result.box[i].from, result.box[i].to]])),
    startsTried: result.startsTried,
    equilibria: result.equilibria.map((one) => ({ ...one, state: byName(symbols, one.state) })),
  };
}
