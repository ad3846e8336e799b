import { useState } from 'react';
import { Link, useNavigate, useSearchParams } from 'react-router-dom';

import { Button } from '@/components/ui/button';
import { ApiError } from '@/lib/api-client';
import { useRefreshSession } from '@/lib/session';

import { confirmAccount } from './api/account-operations';
import { LINK_CLASSES, NarrowPage } from './components/narrow-page';

/** A press, not the visit, uses the link: mail scanners visit links too. */
export default function ConfirmPage() {
  const token = useSearchParams()[0].get('token') ?? '';
  const refresh = useRefreshSession();
  const navigate = useNavigate();
  const [problem, setProblem] = useState('');

  const handleConfirm = async () => {
    try {
      await confirmAccount(token);
      await refresh();
      await navigate('/');
    } catch (error) {
      setProblem(error instanceof ApiError ? error.message : 'That did not work. Try again.');
    }
  };

  return (
    <NarrowPage
      title="Finish your account"
      intro="One press, and the account is yours."
      below={
        problem ? (
          <Link className={LINK_CLASSES} to="/sign-up">
            Ask for a new message
          </Link>
        ) : null
      }
    >
      <Button look="primary" onClick={() => void handleConfirm()}>
        Finish and sign in
      </Button>
      {problem ? (
        <p role="alert" className="text-caution">
          {problem}
        </p>
      ) : null}
    </NarrowPage>
  );
}
