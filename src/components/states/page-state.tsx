import type { ReactNode } from 'react';

import { ApiError } from '@/lib/api-client';

interface PageStateProps {
  readonly title: string;
  readonly children?: ReactNode;
  readonly actions?: ReactNode;
  readonly role?: 'status' | 'alert';
}

/** Empty, denied, failed and missing pages: what happened, and the next thing to do. */
export function PageState({ title, children, actions, role }: PageStateProps) {
  return (
    <div role={role} className="mx-auto grid max-w-lg gap-3 px-4 py-16 text-center">
      <h2 className="text-2xl">{title}</h2>
      {children ? <div className="text-muted">{children}</div> : null}
      {actions ? <div className="flex flex-wrap justify-center gap-2 pt-2">{actions}</div> : null}
    </div>
  );
}

export function LoadingState({ label }: { readonly label: string }) {
  return (
    <p role="status" className="px-4 py-16 text-center text-muted">
      {label}
    </p>
  );
}

const TITLES: Readonly<Record<string, string>> = {
  'not-found': 'Nothing is here',
  'not-allowed': 'This is not open to you',
  'not-signed-in': 'Sign in to see this',
  'no-connection': 'No connection',
};

export function ErrorState({ error, actions }: { readonly error: unknown; readonly actions?: ReactNode }) {
  const code = error instanceof ApiError ? error.code : 'internal';
  const message =
    error instanceof Error ? error.message : 'Something went wrong. Reload the page to try again.';
  return (
    <PageState role="alert" title={TITLES[code] ?? 'That did not work'} actions={actions}>
      {message}
    </PageState>
  );
}
