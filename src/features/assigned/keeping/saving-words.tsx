import { Button } from '@/components/ui/button';

import type { RevisionKeeper, Saving } from './revision-keeper';

function words<Body>(saving: Saving<Body>): string {
  if (saving.state === 'saved') return 'Saved';
  if (saving.state === 'failed') return `Not saved: ${saving.message}`;
  return saving.state === 'conflict' ? 'Not saved' : 'Saving';
}

/** Whether everything is kept; and, where someone else saved too, the choice of either. */
export function SavingWords<Body, Edits extends object>({
  keeper,
  saving,
}: {
  readonly keeper: RevisionKeeper<Body, Edits>;
  readonly saving: Saving<Body>;
}) {
  const bad = saving.state === 'failed' || saving.state === 'conflict';
  return (
    <div className="grid gap-2">
      <p role="status" className={bad ? 'text-caution' : 'text-muted'}>
        {words(saving)}
      </p>
      {saving.state === 'conflict' ? (
        <div role="alert" className="grid gap-2 rounded-lg border border-caution bg-raised p-3">
          <p>
            Someone else saved this in the meantime, perhaps you in another window. Your changes are still
            here.
          </p>
          <div className="flex flex-wrap gap-2">
            <Button onClick={() => void keeper.keepMine()}>Save mine over theirs</Button>
            <Button onClick={keeper.takeTheirs}>Drop mine, take theirs</Button>
          </div>
        </div>
      ) : null}
      {saving.state === 'failed' ? (
        <p>
          <Button size="small" onClick={() => void keeper.flush()}>
            Try again now
          </Button>
        </p>
      ) : null}
    </div>
  );
}
