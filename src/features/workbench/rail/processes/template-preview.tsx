import { lazy, Suspense } from 'react';

import type { TemplateOutcome } from '@/engine/schema/templates';

import { useWorkbench } from '../../state/store';

/** Typesetting needs the parser, which nothing else on the first page does. */
const TypesetChange = lazy(() => import('./typeset-change'));

/** What a template would write: formulas, effects, and what it adds to the table and the parameters. */
export function TemplatePreview({ outcome }: { readonly outcome: TemplateOutcome }) {
  const before = useWorkbench((state) => state.document);
  if (!outcome.ok)
    return (
      <div className="rounded-lg border border-hairline bg-panel p-3 text-sm text-muted">
        <p>Nothing can be written yet:</p>
        <ul className="list-disc pl-5">
          {outcome.problems.map((one) => (
            <li key={`${one.field}:${one.message}`}>{one.message}</li>
          ))}
        </ul>
      </div>
    );
  const after = outcome.document;
  const written = after.processes.filter((one) => one.template?.group === outcome.group);
  const formulas = after.intermediates.filter(
    (one) => !before.intermediates.some((old) => old.symbol === one.symbol),
  );
  const parameters = after.parameters.filter(
    (one) => !before.parameters.some((old) => old.symbol === one.symbol),
  );
  const traits = after.traits.filter((one) => !before.traits.some((old) => old.symbol === one.symbol));
  return (
    <section
      aria-label="Preview"
      className="grid gap-3 rounded-lg border border-hairline bg-panel p-3 text-sm"
    >
      <h3 className="text-base">What will be written</h3>
      <Suspense fallback={null}>
        <TypesetChange processes={written} formulas={formulas} />
      </Suspense>
      <ul className="grid max-h-[45vh] gap-2 overflow-y-auto">
        {formulas.map((one) => (
          <li key={one.symbol}>
            <code className="figures break-all">
              {one.symbol} = {one.formula}
            </code>
          </li>
        ))}
        {written.map((one) => (
          <li key={one.id}>
            <span className="font-medium">{one.name}</span>
            <br />
            <code className="figures break-all">{one.rate}</code>
            <br />
            <span className="text-muted">
              {one.effects.map((effect) => `${effect.class} by ${effect.amount}`).join(', ')}
            </span>
          </li>
        ))}
      </ul>
      {traits.length + parameters.length > 0 ? (
        <p className="text-muted">
          Adds{' '}
          {[
            ...traits.map((one) => `trait ${one.name} (${one.symbol})`),
            ...parameters.map((one) => `${one.name} (${one.symbol} = ${one.value})`),
          ].join(', ')}
          . The values are to be replaced by yours.
        </p>
      ) : null}
    </section>
  );
}
