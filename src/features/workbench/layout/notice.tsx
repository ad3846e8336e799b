import { X } from 'lucide-react';
import { useEffect } from 'react';

import { useBenchUi } from './bench-ui';

/** Long enough to read twice. */
const SHOWN_FOR = 8000;

/** What just happened, in a few words, at the foot of the page. */
export function Notice() {
  const notice = useBenchUi((state) => state.notice);
  const set = useBenchUi((state) => state.set);
  useEffect(() => {
    if (notice === null) return;
    const timer = window.setTimeout(() => set({ notice: null }), SHOWN_FOR);
    return () => window.clearTimeout(timer);
  }, [notice, set]);
  return (
    <div role="status" className="pointer-events-none fixed bottom-20 left-1/2 z-50 -translate-x-1/2">
      {notice ? (
        <p className="pointer-events-auto flex items-center gap-3 rounded-md bg-ink px-4 py-2 text-paper shadow-lg">
          {notice}
          <button type="button" aria-label="Dismiss" onClick={() => set({ notice: null })}>
            <X size={15} aria-hidden />
          </button>
        </p>
      ) : null}
    </div>
  );
}
