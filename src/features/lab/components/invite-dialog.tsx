import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState, type ChangeEvent } from 'react';

import { SelectField } from '@/components/fields/select-field';
import { TextAreaField } from '@/components/fields/text-area-field';
import { buttonClasses, Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { INVITATION_DAYS, MOST_INVITED, type InvitationPreview } from '@/contract/labs';
import { ROLES, type Role } from '@/contract/rights';
import { plural } from '@/lib/format';

import { invite, LAB_KEYS, previewInvitations } from '../api/lab-operations';
import { decodeText, LARGEST_FILE, readInvitationRows } from '../read-invitation-rows';
import { PreviewTable } from './preview-table';

const DAYS = [3, 7, INVITATION_DAYS.usual, 30, INVITATION_DAYS.longest].map((days) => ({
  value: String(days),
  label: plural(days, 'day'),
}));
const ROLE_CHOICES = ROLES.map((role) => ({ value: role, label: role }));

interface InviteDialogProps {
  readonly labId: string;
  readonly onInvited: (words: string) => void;
  readonly onClose: () => void;
}

/** Takes addresses, shows what became of each row, and invites those that are good. */
export function InviteDialog({ labId, onInvited, onClose }: InviteDialogProps) {
  const queries = useQueryClient();
  const [text, setText] = useState('');
  const [role, setRole] = useState<Role>('student');
  const [days, setDays] = useState<string>(String(INVITATION_DAYS.usual));
  const [problem, setProblem] = useState('');
  const [preview, setPreview] = useState<InvitationPreview | null>(null);
  const good = preview?.rows.filter((row) => row.problem === null) ?? [];
  const bad = (preview?.rows.length ?? 0) - good.length;

  const look = useMutation({
    mutationFn: () => previewInvitations(labId, { rows: readInvitationRows(text), role }),
    onSuccess: setPreview,
    onError: (error) => setProblem(error.message),
  });
  const send = useMutation({
    mutationFn: () =>
      invite(labId, {
        invitations: good.map((row) => ({ email: row.email, role: row.role })),
        days: Number(days),
      }),
    onSuccess: (list) => {
      queries.setQueryData(LAB_KEYS.invitations(labId), list);
      const left = bad === 0 ? '' : ` ${plural(bad, 'row was', 'rows were')} left out.`;
      onInvited(`${plural(good.length, 'person was', 'people were')} invited.${left}`);
    },
    onError: (error) => {
      setProblem(error.message);
      // Something changed since the preview; the rows are looked at again.
      look.mutate();
    },
  });

  const handleLook = () => {
    const count = readInvitationRows(text).length;
    if (count === 0) setProblem('There is no address yet. Paste some, or read a file.');
    else if (count > MOST_INVITED)
      setProblem(`These are ${count} rows; at most ${MOST_INVITED} are invited at once. Take some out.`);
    else {
      setProblem('');
      look.mutate();
    }
  };
  const handleFile = async (event: ChangeEvent<HTMLInputElement>) => {
    const [file] = event.target.files ?? [];
    event.target.value = '';
    if (!file) return;
    if (file.size > LARGEST_FILE) {
      setProblem(`“${file.name}” is too large to be a list of addresses. Choose a CSV file below 200 kB.`);
      return;
    }
    setText(decodeText(new Uint8Array(await file.arrayBuffer())));
    setProblem('');
  };

  return (
    <Dialog
      open
      onOpenChange={onClose}
      title="Invite people"
      description={
        preview
          ? 'Nothing has been sent yet. Rows with a problem are left out.'
          : 'Each address gets a message with a link. Whoever opens it reads the invitation and accepts or declines.'
      }
    >
      {preview ? (
        <div className="grid gap-4">
          <PreviewTable preview={preview} />
          {problem ? (
            <p role="alert" className="text-caution">
              {problem}
            </p>
          ) : null}
          <div className="flex flex-wrap justify-end gap-2">
            <Button onClick={() => setPreview(null)}>Back to the addresses</Button>
            <Button
              look="primary"
              disabled={good.length === 0 || send.isPending || look.isPending}
              onClick={() => send.mutate()}
            >
              {good.length === 0
                ? 'No row can be invited'
                : `Invite ${plural(good.length, 'person', 'people')}${bad > 0 ? `, leave out ${bad}` : ''}`}
            </Button>
          </div>
        </div>
      ) : (
        <div className="grid gap-4">
          <TextAreaField
            label="Addresses"
            rows={7}
            value={text}
            onChange={setText}
            placeholder={'ada@example.org\nrui@example.org, researcher'}
            help="One a line, or with commas between them. A role may follow an address. A CSV may have columns headed email and role."
            error={problem || undefined}
          />
          <label
            className={buttonClasses(
              'plain',
              'normal',
              'justify-self-start focus-within:outline-2 focus-within:outline-accent',
            )}
          >
            Read a CSV file
            <input
              type="file"
              accept=".csv,.tsv,.txt,text/csv,text/plain"
              className="sr-only"
              onChange={(event) => void handleFile(event)}
            />
          </label>
          <div className="grid gap-4 sm:grid-cols-2">
            <SelectField
              label="Role, where a row names none"
              value={role}
              choices={ROLE_CHOICES}
              onChange={setRole}
            />
            <SelectField label="Stands for" value={days} choices={DAYS} onChange={setDays} />
          </div>
          <div className="flex justify-end gap-2">
            <Button onClick={onClose}>Cancel</Button>
            <Button look="primary" disabled={look.isPending} onClick={handleLook}>
              Look at the rows
            </Button>
          </div>
        </div>
      )}
    </Dialog>
  );
}
