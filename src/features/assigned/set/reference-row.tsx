import { CheckField } from '@/components/fields/check-field';
import { NumberField } from '@/components/fields/number-field';
import { SelectField } from '@/components/fields/select-field';
import { TextAreaField } from '@/components/fields/text-area-field';
import { ASSIGNED_LIMITS, type ReferenceFinding, type WantedFinding } from '@/contract/assigned-sweeps';
import { formatNumber } from '@/graphics/numbers';

import type { Candidate } from './set-view';

interface ReferenceRowProps {
  readonly wanted: WantedFinding;
  readonly finding: ReferenceFinding;
  /** Null while there is no sweep to take them from. */
  readonly candidates: readonly Candidate[] | null;
  readonly onChange: (finding: ReferenceFinding) => void;
}

/** What is expected for one finding; anything changed in it has to be confirmed anew. */
export function ReferenceRow({ wanted, finding, candidates, onChange }: ReferenceRowProps) {
  const put = (patch: Partial<ReferenceFinding>) => onChange({ ...finding, confirmed: false, ...patch });
  const points = candidates ?? [];
  const chosen = points.findIndex((one) => one.parameter === finding.value);
  const empty = finding.value === null && !finding.text.trim();
  return (
    <li className="grid gap-2 p-3 sm:grid-cols-[minmax(0,1fr)_auto]">
      <div className="grid min-w-0 gap-2">
        <p className="font-medium">{wanted.label}</p>
        <div className="flex flex-wrap items-start gap-2">
          {wanted.kind === 'reading' ? (
            <TextAreaField
              label={`Reference for ${wanted.label}`}
              visibleLabel={false}
              rows={2}
              className="w-full"
              maxLength={ASSIGNED_LIMITS.textLength}
              placeholder="What is expected, in words"
              value={finding.text}
              onChange={(text) => put({ text })}
            />
          ) : (
            <NumberField
              label={`Reference for ${wanted.label}`}
              className="w-44"
              placeholder="value"
              value={finding.value}
              onCommit={(value) => put({ value })}
              onClear={() => put({ value: null })}
              {...(wanted.kind === 'number' ? { unit: wanted.unit } : {})}
            />
          )}
          {points.length > 1 ? (
            <SelectField
              label={`Which ${wanted.kind === 'special point' ? wanted.point : 'point'} for ${wanted.label}`}
              visibleLabel={false}
              className="w-60 max-w-full"
              value={chosen < 0 ? '' : String(chosen)}
              choices={[
                { value: '', label: `One of ${points.length}…` },
                ...points.map((one, index) => ({
                  value: String(index),
                  label: `at ${formatNumber(one.parameter, 6)}`,
                })),
              ]}
              onChange={(value) => {
                const point = points[Number(value)];
                if (value !== '' && point) put({ value: point.parameter });
              }}
            />
          ) : null}
        </div>
        {wanted.kind === 'special point' && candidates?.length === 0 ? (
          <p className="text-sm text-caution">
            This sweep has no {wanted.point} of the {wanted.of === 'split' ? 'split model' : 'pooled twin'}.
          </p>
        ) : null}
        {chosen >= 0 ? <p className="text-sm text-muted">{points[chosen]?.meaning}</p> : null}
      </div>
      <CheckField
        label="Confirmed"
        checked={finding.confirmed}
        disabled={empty}
        onChange={(confirmed) => put({ confirmed })}
      />
    </li>
  );
}
