import { Link } from 'react-router-dom';

import { Markdown } from '@/components/markdown/markdown';
import { Button } from '@/components/ui/button';
import { describeDue, formatDue, isPast } from '@/lib/due';

import { Card } from '../findings/card';
import { useBenchUi } from '../layout/bench-ui';
import { givenFor } from '../state/assigned';
import { useWorkbench } from '../state/store';
import { FindingField } from './finding-field';
import { SavingLine } from './saving-line';
import { useAssignedActions } from './assigned-actions';

/** What is asked, what is found so far, and the way to hand it in. */
export function AssignedCard() {
  const assigned = useWorkbench((state) => state.assigned);
  const set = useBenchUi((state) => state.set);
  const actions = useAssignedActions();
  if (!assigned) return null;
  const { task, findings } = assigned;
  const done = task.wanted.filter((one) => {
    const given = givenFor(findings, one.id);
    return given.value !== null || given.text.trim() !== '';
  }).length;
  const late = task.dueAt !== null && isPast(task.dueAt);
  const [last] = task.handIns;
  return (
    <Card
      accent
      title="Assigned sweep"
      aside={
        <Link className="text-sm text-accent underline" to={`/assigned/${task.id}`}>
          brief and hand-ins
        </Link>
      }
    >
      <div className="grid gap-2">
        <p className="font-medium">{task.title}</p>
        {task.dueAt ? (
          <p className={late ? 'text-sm text-caution' : 'text-sm text-muted'}>
            Due {formatDue(task.dueAt, task.timeZone)}, {describeDue(task.dueAt)}.
          </p>
        ) : null}
        {task.brief ? (
          <details>
            <summary className="cursor-pointer text-sm text-muted">Brief</summary>
            <div className="pt-1.5">
              <Markdown text={task.brief} />
            </div>
          </details>
        ) : null}
        {last?.review?.outcome === 'sent back' ? (
          <div className="rounded-md border border-caution p-2 text-sm">
            <p className="font-medium text-caution">Sent back by {last.review.by}</p>
            <p className="whitespace-pre-wrap">{last.review.note}</p>
          </div>
        ) : null}
        <h3 className="text-base">
          Findings, {done} of {task.wanted.length} given
        </h3>
        <ul className="divide-y">
          {task.wanted.map((one) => (
            <FindingField key={one.id} wanted={one} />
          ))}
        </ul>
        <SavingLine onKeepMine={actions.keepMine} onTakeTheirs={actions.takeTheirs} />
        {task.state === 'closed' ? (
          <p className="text-sm text-caution">This sweep is closed: nothing more is kept or handed in.</p>
        ) : (
          <Button look="primary" onClick={() => set({ dialog: 'hand-in' })}>
            Hand in…
          </Button>
        )}
      </div>
    </Card>
  );
}
