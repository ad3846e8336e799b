import { useQuery } from '@tanstack/react-query';

import { Button } from '@/components/ui/button';

import { fetchDemoAccounts } from '../api/account-operations';

/** Invented people of the demo, one click each. */
export function DemoAccounts({
  onChoose,
}: {
  readonly onChoose: (account: { email: string; password: string }) => void;
}) {
  const accounts = useQuery({ queryKey: ['demo-accounts'], queryFn: fetchDemoAccounts });
  if (!accounts.data) return null;
  return (
    <section aria-labelledby="demo-accounts" className="grid gap-2 rounded-lg border bg-panel p-4">
      <h2 id="demo-accounts" className="text-lg">
        Demo accounts
      </h2>
      <p className="text-sm text-muted">Invented people of an invented lab. Choose one to sign in.</p>
      <div className="grid gap-1.5">
        {accounts.data.accounts.map((account) => (
          <Button key={account.email} className="justify-between" onClick={() => onChoose(account)}>
            <span>{account.name}</span>
            <span className="text-muted">{account.role}</span>
          </Button>
        ))}
      </div>
    </section>
  );
}
