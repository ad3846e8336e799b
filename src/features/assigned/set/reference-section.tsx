import { useMemo, useState } from 'react';

import { SelectField } from '@/components/fields/select-field';
import { formatDayAndTime } from '@/lib/format';
import { useTheme } from '@/lib/theme';
import { PALETTES } from '@/graphics/palette';

import { RunProgress } from '../engine/run-progress';
import { useSweepRun } from '../engine/use-sweep-run';
import { KeptPlot } from '../plot/kept-plot';
import { classChoices, keptSweepSpec, type KeptLayer } from '../plot/kept-sweep-spec';
import { SpecialPointTable } from '../plot/special-point-table';
import { ReferenceRow } from './reference-row';
import { SetSection } from './set-section';
import { candidatesFor, fillReference, referenceFor, withReference, type SetPart } from './set-view';

/** What is expected: from a run of the engine in this browser, looked at and confirmed one by one. */
export function ReferenceSection({
  view,
  onChange,
  latest,
}: SetPart & {
  /** The sweep as it is when a run ends: it may have been edited while that was under way. */
  readonly latest: () => SetPart['view'];
}) {
  const palette = PALETTES[useTheme((state) => state.theme)];
  const { running, problem, run, cancel } = useSweepRun();
  const [note, setNote] = useState('');
  const classes = classChoices(view.document);
  const [symbol, setSymbol] = useState(classes[0]?.value ?? '');
  const { sweep } = view.reference;
  const layers = useMemo(
    (): readonly KeptLayer[] =>
      sweep
        ? [
            ...(sweep.twin
              ? [{ id: 'twin', name: 'pooled twin', model: sweep.twin, tone: 'grey' as const }]
              : []),
            { id: 'split', name: 'split model', model: sweep.split, tone: 'hue' as const },
          ]
        : [],
    [sweep],
  );
  const spec = useMemo(
    () => (sweep ? keptSweepSpec(view.document, sweep.range, layers, symbol, palette) : null),
    [sweep, layers, symbol, palette, view.document],
  );
  const stale =
    sweep !== null &&
    (sweep.range.parameter !== view.range.parameter ||
      sweep.range.from !== view.range.from ||
      sweep.range.to !== view.range.to);

  const handleRun = async () => {
    setNote('');
    const done = await run(view.document, view.range);
    if (!done) return;
    if (done.status === 'cancelled') setNote('The run was cancelled, and nothing was taken over.');
    else if (done.status === 'failed') setNote(`Nothing was taken over. ${done.message}`);
    else onChange({ reference: fillReference(latest(), done.kept) });
  };

  return (
    <SetSection
      title="Reference"
      note="What your own run gives. Nobody whom the sweep is for sees it before their review."
    >
      <RunProgress
        label={sweep ? 'Compute the reference anew' : 'Compute the reference'}
        running={running}
        problem={problem}
        onRun={() => void handleRun()}
        onCancel={cancel}
      />
      {note ? <p role="alert">{note}</p> : null}
      {stale ? (
        <p className="text-caution">The sweep was changed after this was computed. Compute it anew.</p>
      ) : null}
      {sweep && spec ? (
        <>
          <div className="flex flex-wrap items-end justify-between gap-3">
            <p className="text-sm text-muted">
              Computed {formatDayAndTime(sweep.computedAt)}. {sweep.split.message}
            </p>
            <SelectField
              label="Drawn"
              className="w-56"
              value={symbol}
              choices={classes}
              onChange={setSymbol}
            />
          </div>
          <KeptPlot spec={spec} palette={palette} />
          <SpecialPointTable layers={layers} parameter={sweep.range.parameter} />
        </>
      ) : null}
      {view.wanted.length > 0 ? (
        <ol aria-label="Reference findings" className="divide-y rounded-lg border bg-raised">
          {view.wanted.map((wanted) => (
            <ReferenceRow
              key={wanted.id}
              wanted={wanted}
              finding={referenceFor(view.reference.findings, wanted.id)}
              candidates={sweep ? candidatesFor(sweep, wanted) : null}
              onChange={(finding) => onChange({ reference: withReference(latest(), finding) })}
            />
          ))}
        </ol>
      ) : null}
    </SetSection>
  );
}
