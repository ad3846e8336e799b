import type { WorkbenchState, WorkbenchStore } from '../state/store';

const RESULTS = [
  'result',
  'sweep',
  'cycles',
  'sweepOutdated',
  'twoParameters',
  'longRun',
  'selectedPoint',
  'shownReport',
  'report',
] as const;

function differ(state: WorkbenchState, before: WorkbenchState): boolean {
  return RESULTS.some((key) => state[key] !== before[key]);
}

/** Tells when what a picture shows has changed: results alone, or the numbers under its handles too. */
export function watchPictures(
  store: WorkbenchStore,
  follow: 'results' | 'handles',
  notify: () => void,
): () => void {
  return store.subscribe((state, before) => {
    const moved =
      state.document !== before.document ||
      state.sweepSelection !== before.sweepSelection ||
      (state.job === null) !== (before.job === null);
    if (differ(state, before) || (follow === 'handles' && moved)) notify();
  });
}
