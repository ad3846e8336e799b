import { SPREAD_KEY } from '@/engine/schema/symbols';

import type { WorkbenchState } from '../state/store';
import type { TwoParameters } from '../state/two-parameters';
import { defaultRange } from '../strip/default-range';

/** Spread ends where the model says; what is asked for first ends a little beyond the traits as entered. */
const MOST_SPREAD = 1.5;

/** The second parameter as chosen, or the one to begin with: spread where there is any, else another parameter. */
export function secondParameter(state: WorkbenchState): TwoParameters['second'] {
  const { second } = state.twoParameters;
  const swept = state.sweepSelection?.parameter;
  if (second && second.parameter !== swept) return second;
  const parameters = state.shownReport?.parameters ?? [];
  const spread = parameters.find((one) => one.key === SPREAD_KEY && one.key !== swept);
  const split = state.shownReport !== null && state.shownReport.twin.kind !== 'no-split';
  const chosen =
    split && spread ? spread : parameters.find((one) => one.group === 'parameter' && one.key !== swept);
  return chosen ? secondAt(state, chosen.key) : null;
}

/** A parameter with the range to begin with. */
export function secondAt(state: WorkbenchState, key: string): TwoParameters['second'] {
  const report = state.shownReport?.parameters.find((one) => one.key === key);
  if (!report) return null;
  if (key === SPREAD_KEY) {
    const limit = state.shownReport?.spreadLimits.find((one) => one.key === SPREAD_KEY);
    return { parameter: key, from: 0, to: Math.min(limit?.to ?? MOST_SPREAD, MOST_SPREAD) };
  }
  return { parameter: key, ...defaultRange(state.document, report) };
}
