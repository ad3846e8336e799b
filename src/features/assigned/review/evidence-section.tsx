import { useMemo, useState } from 'react';

import { SelectField } from '@/components/fields/select-field';
import type { KeptSweep } from '@/contract/kept-sweep';
import { formatNumber } from '@/graphics/numbers';
import { PALETTES } from '@/graphics/palette';
import { useTheme } from '@/lib/theme';

import { RunProgress } from '../engine/run-progress';
import { useSweepRun } from '../engine/use-sweep-run';
import { KeptPlot } from '../plot/kept-plot';
import { classChoices, keptSweepSpec, type KeptLayer } from '../plot/kept-sweep-spec';
import { SpecialPointTable } from '../plot/special-point-table';
import { compareSweeps, compareWords } from './compare-sweeps';
import { PlotRemarks, RemarkPins, type Place } from './plot-remarks';
import type { ReviewPart } from './review-view';

type Model = 'split' | 'twin';

const MODELS = [
  { value: 'split', label: 'split model' },
  { value: 'twin', label: 'pooled twin' },
] as const;

function layerOf(
  sweep: KeptSweep | null | undefined,
  of: Model,
  layer: Pick<KeptLayer, 'id' | 'name' | 'tone'>,
  parameter: string,
): readonly KeptLayer[] {
  const model = sweep?.range.parameter === parameter ? sweep[of] : null;
  return model ? [{ ...layer, model }] : [];
}

/** Their sweep over the reference, with remarks pinned in it, and the sweep run anew from what was frozen. */
export function EvidenceSection({ handIn, review, onChange }: ReviewPart) {
  const palette = PALETTES[useTheme((state) => state.theme)];
  const { running, problem, run, cancel } = useSweepRun();
  const { document, range, sweep, reference } = handIn;
  const classes = classChoices(document);
  const [symbol, setSymbol] = useState(classes[0]?.value ?? '');
  const [model, setModel] = useState<Model>('split');
  const [draft, setDraft] = useState<Place | null>(null);
  const [replay, setReplay] = useState<KeptSweep | null>(null);
  const [said, setSaid] = useState<readonly string[]>([]);
  const layers = useMemo(
    () => [
      ...layerOf(
        reference.sweep,
        model,
        { id: 'reference', name: 'reference', tone: 'grey' },
        range.parameter,
      ),
      ...layerOf(sweep, model, { id: 'theirs', name: 'theirs', tone: 'hue' }, range.parameter),
      ...layerOf(replay, model, { id: 'replay', name: 'replayed here', tone: 'thin' }, range.parameter),
    ],
    [reference.sweep, sweep, replay, model, range.parameter],
  );
  const spec = useMemo(
    () => keptSweepSpec(document, range, layers, symbol, palette),
    [document, range, layers, symbol, palette],
  );
  const otherParameter = reference.sweep && reference.sweep.range.parameter !== range.parameter;

  const handleReplay = async () => {
    setSaid([]);
    const done = await run(document, range);
    if (!done) return;
    if (done.status === 'cancelled') return setSaid(['The replay was cancelled.']);
    if (done.status === 'failed') return setSaid([`The replay did not come to its end. ${done.message}`]);
    setReplay(done.kept);
    setSaid(
      sweep
        ? compareWords(compareSweeps(sweep, done.kept))
        : ['No sweep was handed in to compare with; what is drawn is the replay.'],
    );
  };
  const handlePoint = (id: string) => {
    const point = spec.points.find((one) => one.id === id);
    if (point) setDraft({ parameter: point.x, value: point.y, of: symbol });
  };

  return (
    <section aria-label="Evidence" className="grid gap-3">
      <div className="flex flex-wrap items-end justify-between gap-3">
        <h2 className="text-xl">Evidence</h2>
        <div className="flex flex-wrap gap-2">
          <SelectField label="Drawn" className="w-48" value={symbol} choices={classes} onChange={setSymbol} />
          <SelectField label="Model" className="w-40" value={model} choices={MODELS} onChange={setModel} />
        </div>
      </div>
      {sweep ? null : <p className="text-muted">They handed in no sweep.</p>}
      {reference.sweep ? null : <p className="text-muted">There is no reference sweep to lay beneath.</p>}
      {otherParameter ? (
        <p className="text-muted">
          The reference is a sweep over {reference.sweep?.range.parameter}, so it cannot lie beneath theirs.
        </p>
      ) : null}
      <KeptPlot
        spec={spec}
        palette={palette}
        onPlace={(parameter, value) => setDraft({ parameter, value, of: symbol })}
        over={(layout) => (
          <RemarkPins remarks={review.remarks} symbol={symbol} draft={draft} layout={layout} />
        )}
      />
      <div className="flex flex-wrap items-end gap-3">
        <SelectField
          label="Pin a remark at a special point"
          className="w-80 max-w-full"
          value=""
          choices={[
            { value: '', label: 'Choose one, or click in the plot' },
            ...spec.points
              .filter(({ id }) => !id.startsWith('replay:'))
              .map(({ id, label, x }) => ({
                value: id,
                label: `${id.startsWith('theirs:') ? 'theirs' : 'reference'}: ${label} at ${formatNumber(x, 6)}`,
              })),
          ]}
          onChange={handlePoint}
        />
        <RunProgress
          label="Replay the sweep"
          running={running}
          problem={problem}
          onRun={() => void handleReplay()}
          onCancel={cancel}
        />
      </div>
      <div role="status">
        {said.map((words) => (
          <p key={words}>{words}</p>
        ))}
      </div>
      <PlotRemarks
        review={review}
        onChange={onChange}
        parameter={range.parameter}
        draft={draft}
        onDraft={setDraft}
      />
      <SpecialPointTable layers={layers} parameter={range.parameter} />
    </section>
  );
}
