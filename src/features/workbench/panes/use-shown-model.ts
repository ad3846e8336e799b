import { useWorkbench } from '../state/store';

/** The document whose results are on show; the one on the bench until there is any. */
export function useShownModel() {
  return useWorkbench((state) => state.shownDocument ?? state.saved);
}
