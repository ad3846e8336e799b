/** What the attracting cycles at the present value add to a verdict: how far they swing, and how low. */
import type { PresetDocument } from '@/engine/schema/preset';
import type { VerdictEvidence } from '@/engine/verdict/contract';
import { totalQuantity } from '@/graphics/quantities';

import { quantityColumn } from './cycle-quantity';
import type { PresentCycle } from './present-cycles';

/** More populations than this have their lowest densities alone, so that the table stays short. */
const MOST_AMPLITUDES = 2;

const attracting = (cycles: readonly PresentCycle[]) => cycles.filter((one) => one.attracts === 1);

/** Rows of amplitude and lowest density, pooled and split; none where no cycle attracts on either side. */
export function cycleEvidence(
  model: PresetDocument,
  split: readonly PresentCycle[],
  pooled: readonly PresentCycle[],
): readonly VerdictEvidence[] {
  const [own] = attracting(split);
  const [twin] = attracting(pooled);
  if (!own && !twin) return [];
  const note = noteOf(attracting(split).length, attracting(pooled).length);
  const rows = model.populations.flatMap((population): VerdictEvidence[] => {
    const name = population.name || population.symbol;
    const read = (cycle: PresentCycle | undefined, of: (low: number, high: number) => number) => {
      const column = cycle ? quantityColumn(model, cycle.quantities, totalQuantity(population.symbol)) : null;
      if (!cycle || !column) return null;
      return of(column[1] * (cycle.lowest[column[0]] ?? NaN), column[1] * (cycle.highest[column[0]] ?? NaN));
    };
    const row = (label: string, of: (low: number, high: number) => number): VerdictEvidence => ({
      label,
      unit: model.densityUnit,
      pooled: read(twin, of),
      split: read(own, of),
      note: '',
    });
    return [
      ...(model.populations.length <= MOST_AMPLITUDES
        ? [row(`cycle amplitude, ${name}`, (low, high) => high - low)]
        : []),
      row(`cycle lowest, ${name}`, (low) => low),
    ];
  });
  const last = rows.at(-1);
  return last ? [...rows.slice(0, -1), { ...last, note }] : rows;
}

function noteOf(split: number, pooled: number): string {
  const side = (count: number, where: string): readonly string[] =>
    count === 0
      ? [`No cycle attracts ${where} at the present value.`]
      : count > 1
        ? [`${count} cycles attract ${where}; the first followed is shown.`]
        : [];
  return [...side(pooled, 'pooled'), ...side(split, 'with the split')].join(' ');
}
