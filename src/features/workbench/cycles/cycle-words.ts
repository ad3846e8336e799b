/** Sentences about cycles, said alike in plots, tables and findings. */
import type { CycleOrigin, CycleSpecialPoint, CyclesResult } from '@/engine/cycles/contract';
import type { PresetDocument } from '@/engine/schema/preset';
import { formatNumber, formatShort } from '@/graphics/numbers';
import { className } from '@/graphics/quantities';

const BEGINNINGS: Readonly<Record<CycleOrigin['kind'], string>> = {
  Hopf: 'from the Hopf point',
  trajectory: 'on which a trajectory settles',
  'period map': 'of the period map',
  'period doubling': 'from the period doubling',
  'branch point of cycles': 'from the branch point of cycles',
};

/** `cycles from the Hopf point at 1.325`. */
export function branchName({ kind, parameter }: CycleOrigin): string {
  if (kind === 'period map') return 'fixed points of the period map';
  return `cycles ${BEGINNINGS[kind]} at ${formatShort(parameter, 4)}`;
}

/** What one cycle of a result is called: under forcing it is a fixed point of the period map. */
export function cycleNoun(result: Pick<CyclesResult, 'forcingPeriod'>): string {
  return result.forcingPeriod === null ? 'cycle' : 'fixed point of the period map';
}

export function cyclePointSentence(point: CycleSpecialPoint): string {
  return `${point.kind} at ${formatNumber(point.parameter, 6)}, period ${formatNumber(point.period, 5)}. ${point.meaning}`;
}

/** Name of a column of a branch: a class, or a population's total. */
export function quantityName(model: PresetDocument, symbol: string): string {
  for (const population of model.populations) {
    const { classes } = population;
    const one = classes.find((member) => member.symbol === symbol);
    if (one) return className(population.name, one.name, symbol, classes.length);
  }
  const population = model.populations.find((one) => one.symbol === symbol);
  return population ? `${population.name || symbol}${population.classes.length > 1 ? ', all' : ''}` : symbol;
}
