import { NavLink, Outlet } from 'react-router-dom';

import { joinClasses } from '@/lib/join-classes';
import { useSession } from '@/lib/session';

import { AppHeader } from './app-header';

function Place({ to, children }: { readonly to: string; readonly children: string }) {
  return (
    <NavLink
      to={to}
      end={to === '/'}
      className={({ isActive }) =>
        joinClasses(
          'rounded-md px-3 py-1.5 hover:bg-panel max-sm:px-2',
          isActive ? 'bg-panel font-semibold text-ink' : 'text-muted',
        )
      }
    >
      {children}
    </NavLink>
  );
}

/** Header with places, and the page beneath it. */
export function SiteLayout() {
  const user = useSession().data?.user;
  return (
    <div className="flex min-h-dvh flex-col">
      <a
        href="#page"
        className="sr-only focus:not-sr-only focus:absolute focus:z-50 focus:bg-raised focus:p-2"
      >
        Skip to the page
      </a>
      <AppHeader>
        {user ? (
          <nav aria-label="Places" className="flex gap-1">
            <Place to="/">Desk</Place>
            <Place to="/presets">Presets</Place>
            <Place to="/lab">Lab</Place>
          </nav>
        ) : null}
      </AppHeader>
      <main id="page" tabIndex={-1} className="flex-1 outline-none">
        <Outlet />
      </main>
    </div>
  );
}
