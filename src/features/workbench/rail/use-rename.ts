import { renameSymbol } from '@/engine/schema/rename';

import { useWorkbenchStore } from '../state/store';

/** Renames a symbol in every formula; a sentence in return says why it cannot be. */
export function useRename() {
  const store = useWorkbenchStore();
  return (from: string, to: string): string | null => {
    const renamed = renameSymbol(store.getState().document, from, to.trim());
    if (!renamed.ok) return renamed.message;
    store.getState().edit(`Rename ${from} to ${to.trim()}`, () => renamed.document);
    return null;
  };
}
