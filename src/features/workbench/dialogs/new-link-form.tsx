import { useMutation } from '@tanstack/react-query';
import { useId, useState } from 'react';

import { FieldMessage } from '@/components/fields/field-message';
import { COMPACT_HEIGHT, COMPACT_INPUT } from '@/components/fields/field-styles';
import { SelectField } from '@/components/fields/select-field';
import { TextField } from '@/components/fields/text-field';
import { Button } from '@/components/ui/button';
import type { LinkAccess } from '@/contract/presets';
import { joinClasses } from '@/lib/join-classes';

import { createLink } from './api/create-link';
import { errorWords } from './error-words';
import { NewLink } from './new-link';

const A_DAY = 24 * 60 * 60_000;
const ENDS = [
  { value: 'never', label: 'Never' },
  { value: '7', label: 'In 7 days' },
  { value: '30', label: 'In 30 days' },
  { value: '90', label: 'In 90 days' },
  { value: 'date', label: 'After a day…' },
] as const;
type Ends = (typeof ENDS)[number]['value'];

const ACCESS: readonly { readonly value: LinkAccess; readonly label: string }[] = [
  { value: 'copy', label: 'Look and copy' },
  { value: 'view', label: 'Look only' },
];

/** The address that opens a shared preset as its sender sees it now. */
function addressOf(token: string): string {
  const view = new URLSearchParams(window.location.search);
  view.delete('comment');
  return `${window.location.origin}/s/${token}${view.size > 0 ? `?${view.toString()}` : ''}`;
}

/** When a link ends; a chosen day counts whole, in the zone of whoever chooses it. */
function endOf(ends: Ends, day: string): string | null {
  if (ends === 'never') return null;
  if (ends === 'date') return new Date(`${day}T23:59:59.999`).toISOString();
  return new Date(Date.now() + Number(ends) * A_DAY).toISOString();
}

/** Makes a link: for whom, until when, and whether a copy may be made. */
export function NewLinkForm({ id, onMade }: { readonly id: string; readonly onMade: () => void }) {
  const field = useId();
  const [label, setLabel] = useState('');
  const [ends, setEnds] = useState<Ends>('never');
  const [day, setDay] = useState('');
  const [access, setAccess] = useState<LinkAccess>('copy');
  const create = useMutation({
    mutationFn: () => createLink(id, { label, expiresAt: endOf(ends, day), access }),
    onSuccess: () => {
      setLabel('');
      onMade();
    },
  });
  return (
    <>
      <form
        className="grid grid-cols-2 items-end gap-2"
        onSubmit={(event) => {
          event.preventDefault();
          create.mutate();
        }}
      >
        <TextField
          visibleLabel
          live
          className="col-span-2"
          label="Who is it for?"
          placeholder="Reviewers of the spring paper"
          value={label}
          maxLength={120}
          onCommit={setLabel}
        />
        <SelectField label="It ends" value={ends} choices={ENDS} onChange={setEnds} />
        <SelectField label="It lets people" value={access} choices={ACCESS} onChange={setAccess} />
        {ends === 'date' ? (
          <div className="grid gap-1">
            <label htmlFor={field} className="text-sm font-medium">
              Last day
            </label>
            <input
              id={field}
              type="date"
              required
              value={day}
              className={joinClasses('w-full', COMPACT_HEIGHT, COMPACT_INPUT)}
              onChange={(event) => setDay(event.target.value)}
            />
          </div>
        ) : null}
        <Button
          type="submit"
          className="col-start-2"
          disabled={create.isPending || (ends === 'date' && !day)}
        >
          Create link
        </Button>
      </form>
      {access === 'view' ? (
        <p className="text-sm text-muted">
          Copying and export are then refused. Whoever can look can still retype what they see.
        </p>
      ) : null}
      {create.data ? <NewLink key={create.data.link.id} address={addressOf(create.data.token)} /> : null}
      {create.error ? <FieldMessage>{errorWords(create.error)}</FieldMessage> : null}
    </>
  );
}
