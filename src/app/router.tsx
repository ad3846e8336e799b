import type { ComponentType } from 'react';
import { createBrowserRouter, Outlet, ScrollRestoration } from 'react-router-dom';

import { SiteLayout } from '@/components/layout/site-layout';
import type { WorkbenchSource } from '@/features/workbench/workbench-page';
import { LoadingState } from '@/components/states/page-state';

import { RequireSession } from './require-session';
import { NotFound, RouteError } from './route-error';

/** A page in a chunk of its own. The router waits for it, so that no placeholder flashes. */
const page = (load: () => Promise<{ readonly default: ComponentType }>) => async () => ({
  Component: (await load()).default,
});
const workbench = (kind: WorkbenchSource['kind']) => async () => {
  const { WorkbenchRoute } = await import('./workbench-route');
  return { element: <WorkbenchRoute kind={kind} /> };
};

function Root() {
  return (
    <>
      <Outlet />
      <ScrollRestoration />
    </>
  );
}

export function createRouter() {
  return createBrowserRouter([
    {
      element: <Root />,
      errorElement: <RouteError />,
      hydrateFallbackElement: <LoadingState label="Opening Moiety…" />,
      children: [
        { path: '/s/:token', lazy: workbench('shared') },
        {
          element: <RequireSession />,
          children: [
            { path: '/presets/new', lazy: workbench('new') },
            { path: '/presets/:id', lazy: workbench('preset') },
            { path: '/assigned/:id/work', lazy: workbench('assigned') },
          ],
        },
        {
          element: <SiteLayout />,
          children: [
            { path: '/sign-in', lazy: page(() => import('@/features/account/sign-in-page')) },
            { path: '/sign-up', lazy: page(() => import('@/features/account/sign-up-page')) },
            { path: '/confirm', lazy: page(() => import('@/features/account/confirm-page')) },
            { path: '/forgotten', lazy: page(() => import('@/features/account/forgotten-page')) },
            { path: '/reset', lazy: page(() => import('@/features/account/reset-page')) },
            { path: '/mail', lazy: page(() => import('@/features/account/mail-page')) },
            { path: '/join', lazy: page(() => import('@/features/account/join-page')) },
            { path: '/unsubscribe', lazy: page(() => import('@/features/account/unsubscribe-page')) },
            {
              element: <RequireSession />,
              children: [
                { path: '/', lazy: page(() => import('./routes/desk-route')) },
                { path: '/presets', lazy: page(() => import('./routes/library-route')) },
                { path: '/assigned/:id', lazy: page(() => import('@/features/assigned/task/task-page')) },
                { path: '/lab', lazy: page(() => import('./routes/lab-route')) },
                { path: '/lab/history', lazy: page(() => import('@/features/lab/history-page')) },
                { path: '/lab/sweeps', lazy: page(() => import('@/features/assigned/list/sweeps-page')) },
                { path: '/assigned/:id/set', lazy: page(() => import('@/features/assigned/set/set-page')) },
                {
                  path: '/assigned/:id/review',
                  lazy: page(() => import('@/features/assigned/review/review-page')),
                },
                {
                  path: '/hand-ins/:id',
                  lazy: page(() => import('@/features/assigned/review/hand-in-page')),
                },
                { path: '/account', lazy: page(() => import('@/features/account/account-page')) },
              ],
            },
            { path: '*', element: <NotFound /> },
          ],
        },
      ],
    },
  ]);
}
