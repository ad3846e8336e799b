import type { LyapunovResult } from '@/engine/lyapunov/contract';
import { formatNumber } from '@/graphics/numbers';

import { useShownModel } from '../panes/use-shown-model';
import { useWorkbench, useWorkbenchStore } from '../state/store';
import { Card } from './card';

function Side({ result, name }: { readonly result: LyapunovResult; readonly name: string | null }) {
  return (
    <div className="mt-1">
      <p>
        {name ? <span className="text-muted">{name}: </span> : null}
        {result.reading}
      </p>
      <ul className="figures text-[13px]">
        {[...result.exponents].map((value, k) => (
          <li key={k}>
            {formatNumber(value, 3)}{' '}
            <span className="text-muted">± {formatNumber(result.uncertainty[k] ?? NaN, 1)}</span>
          </li>
        ))}
      </ul>
      {result.dimension === null ? null : (
        <p className="text-sm text-muted">
          Kaplan-Yorke dimension <span className="figures">{formatNumber(result.dimension, 3)}</span>
        </p>
      )}
      {result.status === 'complete' ? null : <p className="text-sm text-muted">{result.message}</p>}
    </div>
  );
}

/** Lyapunov exponents of the long run from the start values, split beside pooled. */
export function ExponentsCard() {
  const store = useWorkbenchStore();
  const model = useShownModel();
  const shown = useWorkbench((state) => state.shownReport !== null);
  const answered = useWorkbench((state) => state.longRun.lyapunov);
  if (!shown) return null;
  return (
    <Card
      title="Long run"
      aside={
        <button
          type="button"
          className="text-sm text-accent underline underline-offset-2"
          onClick={() => store.getState().engine?.longRun('lyapunov')}
        >
          Compute exponents
        </button>
      }
    >
      {answered ? (
        <div className="text-sm">
          <p className="text-muted">
            Lyapunov exponents from the start values, per {model.timeUnit}, as computed last.
          </p>
          <Side result={answered.result.split} name={answered.result.twin ? 'split' : null} />
          {answered.result.twin ? <Side result={answered.result.twin} name="pooled" /> : null}
        </div>
      ) : (
        <p className="text-sm text-muted">Exponents tell rest, cycle, torus and chaos apart.</p>
      )}
    </Card>
  );
}
