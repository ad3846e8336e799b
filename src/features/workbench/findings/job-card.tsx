import { useEffect, useState } from 'react';

import { Button } from '@/components/ui/button';

import { useWorkbench } from '../state/store';

/** Progress of a long run, shown only once it is worth showing, with a way to stop it. */
export function JobCard() {
  const job = useWorkbench((state) => state.job);
  const engine = useWorkbench((state) => state.engine);
  const [visible, setVisible] = useState<number | null>(null);
  const id = job?.id ?? null;
  useEffect(() => {
    if (id === null) return;
    const timer = setTimeout(() => setVisible(id), 200);
    return () => clearTimeout(timer);
  }, [id]);
  if (!job || visible !== job.id) return null;
  const percent = Math.round(Math.min(1, Math.max(0, job.fraction)) * 100);
  return (
    <section aria-label="Under way" className="grid gap-1.5 rounded-lg border bg-raised p-3.5">
      <div className="flex items-center justify-between gap-2">
        <span role="status">
          {job.name}: {job.stage}
        </span>
        <Button size="small" onClick={() => engine?.cancel()}>
          Cancel
        </Button>
      </div>
      <div
        role="progressbar"
        aria-label={job.name}
        aria-valuenow={percent}
        aria-valuemin={0}
        aria-valuemax={100}
        className="h-1.5 overflow-hidden rounded-full bg-hairline"
      >
        <div className="h-full bg-accent" style={{ width: `${percent}%` }} />
      </div>
    </section>
  );
}
