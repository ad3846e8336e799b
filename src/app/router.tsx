import { lazy } from 'react';
import { createBrowserRouter, Outlet, ScrollRestoration } from 'react-router-dom';

import { SiteLayout } from '@/components/layout/site-layout';

import { RequireSession } from './require-session';
import { NotFound, RouteError } from './route-error';
import { WorkbenchRoute } from './workbench-route';

const SignInPage = lazy(() => import('@/features/account/sign-in-page'));
const SignUpPage = lazy(() => import('@/features/account/sign-up-page'));
const ConfirmPage = lazy(() => import('@/features/account/confirm-page'));
const ForgottenPage = lazy(() => import('@/features/account/forgotten-page'));
const ResetPage = lazy(() => import('@/features/account/reset-page'));
const JoinPage = lazy(() => import('@/features/account/join-page'));
const UnsubscribePage = lazy(() => import('@/features/account/unsubscribe-page'));
const AccountPage = lazy(() => import('@/features/account/account-page'));
const MailPage = lazy(() => import('@/features/account/mail-page'));
const DeskPage = lazy(() => import('@/features/library/desk-page'));
const LibraryPage = lazy(() => import('@/features/library/library-page'));
const LabPage = lazy(() => import('@/features/lab/lab-page'));

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
      children: [
        { path: '/s/:token', element: <WorkbenchRoute kind="shared" /> },
        {
          element: <RequireSession />,
          children: [
            { path: '/presets/new', element: <WorkbenchRoute kind="new" /> },
            { path: '/presets/:id', element: <WorkbenchRoute kind="preset" /> },
          ],
        },
        {
          element: <SiteLayout />,
          children: [
            { path: '/sign-in', element: <SignInPage /> },
            { path: '/sign-up', element: <SignUpPage /> },
            { path: '/confirm', element: <ConfirmPage /> },
            { path: '/forgotten', element: <ForgottenPage /> },
            { path: '/reset', element: <ResetPage /> },
            { path: '/mail', element: <MailPage /> },
            { path: '/join', element: <JoinPage /> },
            { path: '/unsubscribe', element: <UnsubscribePage /> },
            {
              element: <RequireSession />,
              children: [
                { path: '/', element: <DeskPage /> },
                { path: '/presets', element: <LibraryPage /> },
                { path: '/lab', element: <LabPage /> },
                { path: '/account', element: <AccountPage /> },
              ],
            },
            { path: '*', element: <NotFound /> },
          ],
        },
      ],
    },
  ]);
}
