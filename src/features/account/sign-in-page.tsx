import { useState } from 'react';
import { Link, Navigate, useLocation, useNavigate } from 'react-router-dom';

import { signInSchema } from '@/contract/account';
import { ApiError } from '@/lib/api-client';
import { useRefreshSession, useSession } from '@/lib/session';

import { signIn } from './api/account-operations';
import { AccountForm } from './components/account-form';
import { DemoAccounts } from './components/demo-accounts';
import { LINK_CLASSES, NarrowPage } from './components/narrow-page';

/** Only a path of ours is followed after signing in. */
function returnPath(state: unknown): string {
  const from = (state as { from?: unknown } | null)?.from;
  return typeof from === 'string' && from.startsWith('/') && !from.startsWith('//') ? from : '/';
}

export default function SignInPage() {
  const session = useSession();
  const refresh = useRefreshSession();
  const navigate = useNavigate();
  const location = useLocation();
  const [demoError, setDemoError] = useState('');
  const target = returnPath(location.state);

  if (session.data?.user) return <Navigate to={target} replace />;

  const handleSignIn = async (values: { email: string; password: string }) => {
    await signIn(values);
    await refresh();
    await navigate(target, { replace: true });
  };

  const handleDemo = (account: { email: string; password: string }) => {
    handleSignIn({ email: account.email, password: account.password }).catch((error: unknown) => {
      setDemoError(error instanceof ApiError ? error.message : 'Signing in did not work. Try again.');
    });
  };

  return (
    <NarrowPage
      title="Sign in"
      intro="Does splitting a population stabilise its dynamics? Define the model, sweep it, and compare it with its pooled twin."
      below={
        <>
          <Link className={LINK_CLASSES} to="/sign-up">
            Make an account
          </Link>
          <Link className={LINK_CLASSES} to="/forgotten">
            Forgotten password
          </Link>
        </>
      }
    >
      <AccountForm
        label="Sign in"
        schema={signInSchema}
        initial={{ email: '', password: '' }}
        submitLabel="Sign in"
        onSubmit={handleSignIn}
        fields={[
          { name: 'email', label: 'E-mail', type: 'email', autoComplete: 'username' },
          { name: 'password', label: 'Password', type: 'password', autoComplete: 'current-password' },
        ]}
      />
      {session.data?.demo ? <DemoAccounts onChoose={handleDemo} /> : null}
      {demoError ? (
        <p role="alert" className="text-caution">
          {demoError}
        </p>
      ) : null}
    </NarrowPage>
  );
}
