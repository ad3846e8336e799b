import { useState } from 'react';

import { changeAccountSchema, changePasswordSchema } from '@/contract/account';
import { buttonClasses } from '@/components/ui/button';
import { useRefreshSession, useSession } from '@/lib/session';

import { changeName, changePassword } from './api/account-operations';
import { AccountDeletion } from './components/account-deletion';
import { AccountEvents } from './components/account-events';
import { AccountForm } from './components/account-form';
import { MailSettings } from './components/mail-settings';
import { SessionList } from './components/session-list';

export default function AccountPage() {
  const user = useSession().data?.user;
  const refresh = useRefreshSession();
  const [done, setDone] = useState('');
  const [formNumber, setFormNumber] = useState(0);
  if (!user) return null;
  return (
    <div className="mx-auto grid max-w-2xl grid-cols-[minmax(0,1fr)] gap-10 px-4 py-10">
      <div>
        <h1 className="text-3xl">Account</h1>
        <p className="text-muted">{user.email}</p>
        <p role="status" className="min-h-6 text-accent">
          {done}
        </p>
      </div>
      <section aria-labelledby="name" className="grid max-w-md gap-3">
        <h2 id="name" className="text-xl">
          Name
        </h2>
        <AccountForm
          label="Change name"
          schema={changeAccountSchema}
          initial={{ name: user.name }}
          submitLabel="Change name"
          onSubmit={async ({ name }) => {
            await changeName(name);
            await refresh();
            setDone('Name changed.');
          }}
          fields={[{ name: 'name', label: 'Name', autoComplete: 'name' }]}
        />
      </section>
      <section aria-labelledby="password" className="grid max-w-md gap-3">
        <h2 id="password" className="text-xl">
          Password
        </h2>
        <AccountForm
          key={formNumber}
          label="Change password"
          schema={changePasswordSchema}
          initial={{ current: '', next: '' }}
          submitLabel="Change password"
          onSubmit={async (values) => {
            await changePassword(values);
            await refresh();
            setFormNumber((number) => number + 1);
            setDone('Password changed. Your other sessions have ended.');
          }}
          fields={[
            {
              name: 'current',
              label: 'Current password',
              type: 'password',
              autoComplete: 'current-password',
            },
            { name: 'next', label: 'New password', type: 'password', autoComplete: 'new-password' },
          ]}
        />
      </section>
      <MailSettings />
      <SessionList />
      <AccountEvents />
      <section aria-labelledby="export" className="grid justify-items-start gap-3">
        <h2 id="export" className="text-xl">
          Everything of yours
        </h2>
        <p className="text-muted">
          Presets with all their versions, what you worked on and handed in, and the events of your account,
          as one zip file.
        </p>
        <a href="/api/account/export.zip" className={buttonClasses('plain')}>
          Download it
        </a>
      </section>
      <AccountDeletion />
    </div>
  );
}
