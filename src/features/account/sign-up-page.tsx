import { useState } from 'react';
import { Link } from 'react-router-dom';

import { PASSWORD_LIMITS, signUpSchema } from '@/contract/account';
import { useSession } from '@/lib/session';

import { signUp } from './api/account-operations';
import { AccountForm } from './components/account-form';
import { LINK_CLASSES, NarrowPage } from './components/narrow-page';

export default function SignUpPage() {
  const [sentTo, setSentTo] = useState<string | null>(null);
  const demo = useSession().data?.demo ?? false;

  if (sentTo) {
    return (
      <NarrowPage
        title="Look in your mail"
        intro={`A message is on its way to ${sentTo}. Follow the link in it to finish; it works once.`}
        below={
          demo ? (
            <Link className={LINK_CLASSES} to="/mail">
              Open the mail of the demo
            </Link>
          ) : null
        }
      >
        <p role="status" className="sr-only">
          Message sent.
        </p>
      </NarrowPage>
    );
  }
  return (
    <NarrowPage
      title="Make an account"
      intro="An account keeps your presets and their versions."
      below={
        <Link className={LINK_CLASSES} to="/sign-in">
          I have an account
        </Link>
      }
    >
      <AccountForm
        label="Make an account"
        schema={signUpSchema}
        initial={{ name: '', email: '', password: '' }}
        submitLabel="Make the account"
        onSubmit={async (values) => {
          await signUp(values);
          setSentTo(values.email);
        }}
        fields={[
          { name: 'name', label: 'Name', autoComplete: 'name' },
          { name: 'email', label: 'E-mail', type: 'email', autoComplete: 'username' },
          {
            name: 'password',
            label: 'Password',
            type: 'password',
            autoComplete: 'new-password',
            help: `At least ${PASSWORD_LIMITS.shortest} characters.`,
          },
        ]}
      />
    </NarrowPage>
  );
}
