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
            <span
              role="progressbar"
              aria-label={label}
              aria-valuenow={Math.round(100 * running.fraction)}
              aria-valuemin={0}
              aria-valuemax={100}
              className="h-1.5 w-40 overflow-hidden rounded-full bg-hairline"
            >
              <span
                className="block h-full bg-accent"
                style={{ width: `${Math.round(100 * running.fraction)}%` }}
              />
            </span>
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
