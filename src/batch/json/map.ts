import type { MapResult } from '@/engine/maps/contract';

import { rows, type Json } from './shared';

/** A map or basins: values in rows, the lowest y first, at the centres of the cells. */
export function mapJson(map: MapResult): Json {
  return {
    status: map.status,
    message: map.message,
    quantity: map.quantity,
    x: { ...map.x, centres: centres(map.x) },
    y: { ...map.y, centres: centres(map.y) },
    values: rows(map.values, map.x.cells),
    kinds: map.kinds.map((kind, k) => ({ ...kind, cells: count(map.values, k) })),
    computed: map.computed,
    summary: summary(map),
  };
}

function centres({ from, to, cells }: MapResult['x']): number[] {
  return Array.from({ length: cells }, (_, k) => from + ((to - from) * (k + 0.5)) / cells);
}

function count(values: Float64Array, kind: number): number {
  return values.reduce((sum, value) => sum + (value === kind ? 1 : 0), 0);
}

function summary(map: MapResult): Json {
  const found = map.values.filter(Number.isFinite);
  const withoutAnswer = map.values.length - found.length;
  if (map.kinds.length > 0) return { withoutAnswer };
  return {
    withoutAnswer,
    lowest: found.length > 0 ? found.reduce((a, b) => Math.min(a, b)) : null,
    highest: found.length > 0 ? found.reduce((a, b) => Math.max(a, b)) : null,
  };
}
