import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { Link, useSearchParams } from 'react-router-dom';

import { ErrorState, LoadingState } from '@/components/states/page-state';
import { Button } from '@/components/ui/button';

import { fetchSubscription, subscribeAgain, unsubscribe } from './api/mail-operations';
import { LINK_CLASSES, NarrowPage } from './components/narrow-page';

/** Where the foot of a message leads. No account is needed, and a press, not the visit, changes something. */
export default function UnsubscribePage() {
  const token = useSearchParams()[0].get('token') ?? '';
  const queries = useQueryClient();
  const key = ['subscription', token];
  const subscription = useQuery({ queryKey: key, queryFn: () => fetchSubscription(token) });
  const turn = useMutation({
    mutationFn: (off: boolean) => (off ? unsubscribe(token) : subscribeAgain(token)),
    onSuccess: (fresh) => queries.setQueryData(key, fresh),
  });
  if (subscription.isPending) return <LoadingState label="Reading the link…" />;
  if (subscription.isError) return <ErrorState error={subscription.error} />;
  const { address, label, off } = subscription.data;
  return (
    <NarrowPage
      title={off ? 'This mail is off' : 'Stop this mail'}
      intro={
        <p role="status">
          {off
            ? `Nothing of this kind goes to ${address} any more: ${label}.`
            : `Mail of this kind goes to ${address}: ${label}.`}
        </p>
      }
      below={
        <Link className={LINK_CLASSES} to="/account#mail">
          All that is mailed to you
        </Link>
      }
    >
      <Button look={off ? 'plain' : 'primary'} disabled={turn.isPending} onClick={() => turn.mutate(!off)}>
        {off ? 'Send it again' : 'Stop this mail'}
      </Button>
      {turn.error ? (
        <p role="alert" className="text-caution">
          {turn.error.message}
        </p>
      ) : null}
    </NarrowPage>
  );
}
