import { Button } from '@/components/ui/button';

interface RunProgressProps {
  readonly label: string;
  readonly running: { readonly stage: string; readonly fraction: number } | null;
  readonly problem: string | null;
  readonly disabled?: boolean;
  readonly onRun: () => void;
  readonly onCancel: () => void;
}

/** Starts a sweep, says how far it is, and ends it. */
export function RunProgress({ label, running, problem, disabled, onRun, onCancel }: RunProgressProps) {
  return (
    <div className="grid gap-2">
      <div className="flex flex-wrap items-center gap-3">
        <Button disabled={running !== null || disabled} onClick={onRun}>
          {label}
        </Button>
        {running ? (
          <>
            <progress
              aria-label={label}
              value={running.fraction}
              max={1}
              className="h-2 w-40 accent-[var(--accent)]"
            />
            <span className="text-sm text-muted">{running.stage}</span>
            <Button size="small" look="quiet" onClick={onCancel}>
              Cancel
            </Button>
          </>
        ) : null}
      </div>
      {problem ? (
        <p role="alert" className="text-caution">
          {problem}
        </p>
      ) : null}
    </div>
  );
}
