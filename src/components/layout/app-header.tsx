import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';

import { AccountMenu } from './account-menu';
import { Mark } from './mark';

interface AppHeaderProps {
  /** Navigation, or the breadcrumb of the workbench. */
  readonly children?: ReactNode;
  /** Buttons to the left of the account. */
  readonly actions?: ReactNode;
}

/** The bar along the top of every page. */
export function AppHeader({ children, actions }: AppHeaderProps) {
  return (
    <header className="flex min-h-14 items-center gap-x-5 gap-y-1 border-b bg-paper px-4 max-sm:gap-x-3">
      <Link
        to="/"
        className="flex items-center gap-2 font-heading text-xl font-semibold"
        aria-label="Moiety, to the desk"
      >
        <Mark />
        <span className="max-sm:sr-only">Moiety</span>
      </Link>
      <div className="min-w-0 flex-1">{children}</div>
      {actions ? <div className="flex items-center gap-2">{actions}</div> : null}
      <AccountMenu />
    </header>
  );
}
