import { Link, useLocation } from 'react-router-dom';

import { Button, buttonClasses } from '@/components/ui/button';
import { useSession } from '@/lib/session';

import { useWorkbench } from '../state/store';
import { useBenchUi } from './bench-ui';

/** On a preset opened by link: what can be done with it, and how to keep it. */
export function SharedBanner() {
  const shared = useWorkbench(({ origin }) => (origin.kind === 'shared' ? origin : null));
  const signedIn = Boolean(useSession().data?.user);
  const location = useLocation();
  const set = useBenchUi((state) => state.set);
  if (!shared) return null;
  return (
    <div className="flex flex-wrap items-center gap-x-4 gap-y-1 border-b border-hairline bg-panel px-4 py-1.5 text-sm">
      <p className="flex-1">
        <strong className="font-semibold">Shared preset.</strong> Explore freely; nothing is saved.
      </p>
      {!shared.mayCopy ? (
        <p className="text-muted">For looking: no copy can be made here.</p>
      ) : signedIn ? (
        <Button size="small" onClick={() => set({ dialog: 'save-copy' })}>
          Copy to my presets
        </Button>
      ) : (
        <Link
          to="/sign-in"
          state={{ from: `${location.pathname}${location.search}` }}
          className={buttonClasses('plain', 'small')}
        >
          Sign in to keep a copy
        </Link>
      )}
    </div>
  );
}
