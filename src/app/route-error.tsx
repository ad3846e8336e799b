import { useRouteError } from 'react-router-dom';

import { Button } from '@/components/ui/button';
import { PageState } from '@/components/states/page-state';

/** Last resort for a page that failed to render. Drafts are kept, so reloading loses nothing. */
export function RouteError() {
  const error = useRouteError();
  const words = error instanceof Error ? error.message : 'No reason was given.';
  return (
    <PageState
      role="alert"
      title="This page failed"
      actions={
        <Button look="primary" onClick={() => window.location.reload()}>
          Reload
        </Button>
      }
    >
      <p>
        Unsaved work is kept as a draft. Reload the page; if it fails again, send this line along: {words}
      </p>
    </PageState>
  );
}

export function NotFound() {
  return (
    <PageState title="Nothing is here">
      The address leads to no page. It may have been mistyped, or what it led to was taken away.
    </PageState>
  );
}
