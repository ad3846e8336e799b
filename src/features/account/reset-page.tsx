import { Link, useNavigate, useSearchParams } from 'react-router-dom';

import { resetPasswordSchema } from '@/contract/account';

import { resetPassword } from './api/account-operations';
import { AccountForm } from './components/account-form';
import { LINK_CLASSES, NarrowPage } from './components/narrow-page';

const newPasswordSchema = resetPasswordSchema.pick({ password: true });

export default function ResetPage() {
  const token = useSearchParams()[0].get('token') ?? '';
  const navigate = useNavigate();
  return (
    <NarrowPage
      title="Choose a new password"
      intro="All sessions of the account end when it is changed."
      below={
        <Link className={LINK_CLASSES} to="/forgotten">
          Ask for a new link
        </Link>
      }
    >
      <AccountForm
        label="Choose a new password"
        schema={newPasswordSchema}
        initial={{ password: '' }}
        submitLabel="Change the password"
        onSubmit={async ({ password }) => {
          await resetPassword({ token, password });
          await navigate('/sign-in');
        }}
        fields={[{ name: 'password', label: 'New password', type: 'password', autoComplete: 'new-password' }]}
      />
    </NarrowPage>
  );
}
