import { useMutation, useQuery } from '@tanstack/react-query';

import { FieldMessage } from '@/components/fields/field-message';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { LoadingState } from '@/components/states/page-state';
import type { DepartureBody } from '@/contract/labs';
import { plural } from '@/lib/format';

import { endMembership, fetchDeparture, LAB_KEYS } from '../api/lab-operations';

interface DepartureDialogProps {
  readonly lab: { readonly id: string; readonly name: string };
  readonly userId: string;
  /** Whether people go by themselves. */
  readonly leaving: boolean;
  readonly onDone: (name: string) => void;
  readonly onClose: () => void;
}

function consequences({ name, presets }: DepartureBody, labName: string, leaving: boolean): string[] {
  const [who, whose, they] = leaving ? ['You', 'your', 'you'] : [name, 'their', 'they'];
  const kept =
    presets === 0
      ? `No preset of ${whose === 'your' ? 'yours' : 'theirs'} is open to ${labName}, so nothing changes hands.`
      : `${plural(presets, 'preset')} that ${they} opened to ${labName} ${presets === 1 ? 'stays' : 'stay'} with the lab, with every version. ${who} ${leaving ? 'keep' : 'keeps'} a private copy of ${presets === 1 ? 'it' : 'each'}, as it was last saved.`;
  return [
    `${who} ${leaving ? 'no longer see' : 'no longer sees'} what is open to the lab alone.`,
    kept,
    leaving
      ? 'To come back, you need a new invitation.'
      : `${name} is told by mail, and can be invited again.`,
  ];
}

/** Says what leaving or removal brings before it happens. */
export function DepartureDialog({ lab, userId, leaving, onDone, onClose }: DepartureDialogProps) {
  const departure = useQuery({
    queryKey: LAB_KEYS.departure(lab.id, userId),
    queryFn: () => fetchDeparture(lab.id, userId),
    staleTime: 0,
  });
  const end = useMutation({
    mutationFn: () => endMembership(lab.id, userId),
    onSuccess: () => onDone(departure.data?.name ?? ''),
  });
  const title = leaving ? `Leave ${lab.name}` : `Remove ${departure.data?.name ?? 'a member'}`;
  return (
    <Dialog open onOpenChange={onClose} title={title} width="narrow">
      {departure.isPending ? <LoadingState label="Looking at what would change…" /> : null}
      {departure.isError ? <FieldMessage>{departure.error.message}</FieldMessage> : null}
      {departure.data ? (
        <div className="grid gap-4">
          {departure.data.obstacle ? (
            <FieldMessage severity="warning">{departure.data.obstacle}</FieldMessage>
          ) : (
            <ul className="grid list-disc gap-1.5 pl-5">
              {consequences(departure.data, lab.name, leaving).map((line) => (
                <li key={line}>{line}</li>
              ))}
            </ul>
          )}
          {end.error ? (
            <div role="alert">
              <FieldMessage>{end.error.message}</FieldMessage>
            </div>
          ) : null}
          <div className="flex justify-end gap-2">
            <Button onClick={onClose}>{departure.data.obstacle ? 'Close' : 'Cancel'}</Button>
            {departure.data.obstacle ? null : (
              <Button look="caution" disabled={end.isPending} onClick={() => end.mutate()}>
                {leaving ? 'Leave the lab' : 'Remove'}
              </Button>
            )}
          </div>
        </div>
      ) : null}
    </Dialog>
  );
}
