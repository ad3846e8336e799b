import { useState } from 'react';

import { FieldMessage } from '@/components/fields/field-message';
import { TextAreaField } from '@/components/fields/text-area-field';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { ASSIGNED_LIMITS, type Receipt } from '@/contract/assigned-sweeps';
import { formatNumber } from '@/graphics/numbers';
import { formatDue, isPast } from '@/lib/due';
import { formatDayAndTime } from '@/lib/format';

import { useBenchUi } from '../layout/bench-ui';
import { givenFor, type AssignedWork } from '../state/assigned';
import { useWorkbench, useWorkbenchStore } from '../state/store';
import { useAssignedActions } from './assigned-actions';
import { freeze, sweepStands } from './hand-in-sender';

function FindingList({ assigned }: { readonly assigned: AssignedWork }) {
  return (
    <ul className="divide-y rounded-lg border">
      {assigned.task.wanted.map((wanted) => {
        const given = givenFor(assigned.findings, wanted.id);
        const missing = given.value === null && given.text.trim() === '';
        return (
          <li key={wanted.id} className="flex flex-wrap justify-between gap-x-3 px-3 py-1.5">
            <span>{wanted.label}</span>
            {missing ? (
              <span className="text-caution">nothing given</span>
            ) : (
              <span className="figures">
                {given.value === null ? 'in words' : formatNumber(given.value, 6)}
              </span>
            )}
          </li>
        );
      })}
    </ul>
  );
}

function ReceiptView({ receipt, onClose }: { readonly receipt: Receipt; readonly onClose: () => void }) {
  return (
    <div role="status" className="grid gap-3">
      <p>
        Hand-in {receipt.number} was received {formatDayAndTime(receipt.handedInAt)}
        {receipt.late ? ', after the due date' : ''}. Its receipt is{' '}
        <code className="figures">{receipt.code}</code>; it was mailed to you as well.
      </p>
      <p className="text-muted">
        What was handed in stays as it was. You can go on and hand in again while the sweep is open.
      </p>
      <div className="flex justify-end">
        <Button look="primary" onClick={onClose}>
          Close
        </Button>
      </div>
    </div>
  );
}

/** Freezes model, sweep, results and findings, and sends them. */
export function HandInDialog() {
  const store = useWorkbenchStore();
  const assigned = useWorkbench((state) => state.assigned);
  const stands = useWorkbench(sweepStands);
  const engine = useWorkbench((state) => state.engine);
  const job = useWorkbench((state) => state.job);
  const set = useBenchUi((state) => state.set);
  const actions = useAssignedActions();
  const [note, setNote] = useState('');
  const [busy, setBusy] = useState(false);
  const [problem, setProblem] = useState<string | null>(null);
  const [receipt, setReceipt] = useState<Receipt | null>(null);
  const close = () => set({ dialog: null });
  if (!assigned) return null;
  const { task } = assigned;
  const late = task.dueAt !== null && isPast(task.dueAt);

  const handleSend = async () => {
    setBusy(true);
    setProblem(null);
    const sent = await actions.send(freeze(store.getState(), assigned, note));
    setBusy(false);
    if (sent.kind === 'received') setReceipt(sent.receipt);
    else if (sent.kind === 'refused') setProblem(sent.message);
    else
      setProblem(
        'There is no connection. The hand-in is kept in this browser and sent as soon as the connection is back; you can close this.',
      );
  };

  return (
    <Dialog
      open
      onOpenChange={close}
      title={receipt ? 'Handed in' : `Hand in “${task.title}”`}
      description={
        receipt
          ? undefined
          : 'Model, range, results and findings are frozen as they are now and sent for review.'
      }
    >
      {receipt ? (
        <ReceiptView receipt={receipt} onClose={close} />
      ) : (
        <div className="grid gap-3">
          <FindingList assigned={assigned} />
          {stands ? (
            <p className="text-muted">The sweep on show goes with it.</p>
          ) : (
            <div className="flex flex-wrap items-center justify-between gap-2 rounded-lg border border-caution px-3 py-2">
              <p className="text-caution">
                {job
                  ? 'The sweep is still running.'
                  : 'There is no sweep of the present numbers to go with it.'}
              </p>
              <Button size="small" disabled={job !== null} onClick={() => engine?.sweep()}>
                Run the sweep
              </Button>
            </div>
          )}
          {late && task.dueAt ? (
            <p className="text-caution">
              It was due {formatDue(task.dueAt, task.timeZone)}; it will be marked as late.
            </p>
          ) : null}
          <TextAreaField
            label="Note for the reviewer, if any"
            rows={2}
            value={note}
            maxLength={ASSIGNED_LIMITS.textLength}
            onChange={setNote}
          />
          {problem ? <FieldMessage>{problem}</FieldMessage> : null}
          <div className="flex justify-end gap-2">
            <Button onClick={close}>Cancel</Button>
            <Button look="primary" disabled={busy} onClick={() => void handleSend()}>
              {busy ? 'Handing in…' : stands ? 'Hand in' : 'Hand in without a sweep'}
            </Button>
          </div>
        </div>
      )}
    </Dialog>
  );
}
