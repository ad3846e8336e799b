import { useState } from 'react';
import { Link } from 'react-router-dom';

import { forgottenPasswordSchema } from '@/contract/account';
import { useSession } from '@/lib/session';

import { askForReset } from './api/account-operations';
import { AccountForm } from './components/account-form';
import { LINK_CLASSES, NarrowPage } from './components/narrow-page';

export default function ForgottenPage() {
  const [sent, setSent] = useState(false);
  const demo = useSession().data?.demo ?? false;
  return (
    <NarrowPage
      title="Forgotten password"
      intro={
        sent
          ? 'If an account has this address, a message with a link is on its way. The link works once, for one hour.'
          : 'Enter the address of your account. A link to choose a new password comes by mail.'
      }
      below={
        <>
          <Link className={LINK_CLASSES} to="/sign-in">
            Back to signing in
          </Link>
          {sent && demo ? (
            <Link className={LINK_CLASSES} to="/mail">
              Open the mail of the demo
            </Link>
          ) : null}
        </>
      }
    >
      {sent ? (
        <p role="status" className="sr-only">
          Request taken.
        </p>
      ) : (
        <AccountForm
          label="Forgotten password"
          schema={forgottenPasswordSchema}
          initial={{ email: '' }}
          submitLabel="Send the link"
          onSubmit={async (values) => {
            await askForReset(values);
            setSent(true);
          }}
          fields={[{ name: 'email', label: 'E-mail', type: 'email', autoComplete: 'username' }]}
        />
      )}
    </NarrowPage>
  );
}
