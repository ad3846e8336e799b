import { Navigate, Outlet, useLocation } from 'react-router-dom';

import { Button } from '@/components/ui/button';
import { ErrorState, LoadingState } from '@/components/states/page-state';
import { useSession } from '@/lib/session';

/** Pages for people who are signed in; others are sent to sign in and come back. */
export function RequireSession() {
  const session = useSession();
  const location = useLocation();
  if (session.isPending) return <LoadingState label="Opening Moiety…" />;
  if (session.isError)
    return (
      <ErrorState
        error={session.error}
        actions={<Button onClick={() => void session.refetch()}>Try again</Button>}
      />
    );
  if (!session.data.user)
    return (
      <Navigate
        to="/sign-in"
        replace
        state={{ from: `${location.pathname}${location.search}${location.hash}` }}
      />
    );
  return <Outlet />;
}
