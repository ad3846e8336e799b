import type { PlotLayout } from '@/graphics/plot-layout';
import { formatNumber } from '@/graphics/numbers';
import type { Remark } from '@/contract/assigned-sweeps';

import { NewRemark, RemarkField } from './remark-fields';
import { newRemark, withRemark, type ReviewPart } from './review-view';

export type Place = NonNullable<Remark['place']>;

export function placeWords(parameter: string, place: Place): string {
  return `${parameter} = ${formatNumber(place.parameter, 5)}, ${place.of} = ${formatNumber(place.value, 4)}`;
}

export const pinned = (remarks: readonly Remark[]) => remarks.filter(({ place }) => place !== null);

const fieldId = (remark: Remark) => `remark-${remark.id}`;

/** Numbered pins over the plot; each leads to its remark. */
export function RemarkPins({
  remarks,
  symbol,
  draft,
  layout,
}: {
  readonly remarks: readonly Remark[];
  readonly symbol: string;
  readonly draft: Place | null;
  readonly layout: PlotLayout;
}) {
  const at = (place: Place) => ({ left: layout.x(place.parameter) - 11, top: layout.y(place.value) - 26 });
  return (
    <>
      {pinned(remarks).map((remark, index) =>
        remark.place?.of === symbol ? (
          <button
            key={remark.id}
            type="button"
            title={remark.text}
            aria-label={`Remark ${index + 1} in the plot: ${remark.text}`}
            className="figures absolute size-5.5 rounded-full rounded-bl-none bg-accent text-sm text-accent-ink"
            style={at(remark.place)}
            onClick={() => document.getElementById(fieldId(remark))?.querySelector('textarea')?.focus()}
          >
            {index + 1}
          </button>
        ) : null,
      )}
      {draft && draft.of === symbol ? (
        <span
          aria-hidden
          className="absolute size-5.5 rounded-full rounded-bl-none border-2 border-accent bg-raised"
          style={at(draft)}
        />
      ) : null}
    </>
  );
}

interface PlotRemarksProps extends Pick<ReviewPart, 'review' | 'onChange'> {
  readonly parameter: string;
  readonly draft: Place | null;
  readonly onDraft: (place: Place | null) => void;
}

/** The remarks that are pinned in the plot, and the one that is being pinned. */
export function PlotRemarks({ review, onChange, parameter, draft, onDraft }: PlotRemarksProps) {
  const { remarks } = review;
  return (
    <div className="grid gap-2">
      {pinned(remarks).length > 0 ? (
        <ol aria-label="Remarks in the plot" className="grid gap-2">
          {pinned(remarks).map((remark, index) => (
            <li key={remark.id} id={fieldId(remark)} className="grid gap-1">
              <p className="text-sm text-muted">
                {index + 1}. {remark.place ? placeWords(parameter, remark.place) : ''}
              </p>
              <RemarkField
                label={`Remark ${index + 1} in the plot`}
                remark={remark}
                onChange={(next) => onChange({ remarks: withRemark(remarks, next) })}
                onRemove={() => onChange({ remarks: remarks.filter(({ id }) => id !== remark.id) })}
              />
            </li>
          ))}
        </ol>
      ) : null}
      {draft ? (
        <NewRemark
          key={placeWords(parameter, draft)}
          label={`Remark at ${placeWords(parameter, draft)}`}
          onAdd={(text) => {
            onChange({ remarks: [...remarks, newRemark({ finding: null, place: draft }, text)] });
            onDraft(null);
          }}
          onCancel={() => onDraft(null)}
        />
      ) : null}
    </div>
  );
}
