import { NumberField } from '@/components/fields/number-field';
import { Slider } from '@/components/fields/slider';
import type { SpreadLimit } from '@/engine/system/contract';
import { showNumber } from '@/lib/parse-number';

interface DialRowProps {
  readonly label: string;
  readonly value: number;
  readonly limit: SpreadLimit | undefined;
  /** Where the dial starts and ends when the model sets no closer bound. */
  readonly from: number;
  readonly to: number;
  readonly path: string;
  readonly onChange: (value: number) => void;
}

/** A dial: slider with ticks at 0 and 1, typed value, and why it ends where it does. */
export function DialRow({ label, value, limit, from, to, path, onChange }: DialRowProps) {
  const lowest = limit && Number.isFinite(limit.from) ? Math.max(from, limit.from) : from;
  const highest = limit && Number.isFinite(limit.to) ? Math.min(to, limit.to) : to;
  const check = (next: number): string | null => {
    if (limit && next < limit.from) return `It starts at ${showNumber(limit.from, 6)}: ${limit.fromReason}.`;
    if (limit && next > limit.to) return `It ends at ${showNumber(limit.to, 6)}: ${limit.toReason}.`;
    return null;
  };
  const closes = limit && limit.to < to && limit.toReason;
  return (
    <div>
      <div className="grid grid-cols-[minmax(4.5rem,auto)_1fr_4.5rem] items-start gap-3">
        <span className="pt-1 font-semibold" aria-hidden>
          {label}
        </span>
        <Slider
          label={label}
          value={value}
          min={lowest}
          max={Math.max(highest, lowest + 1e-9)}
          valueText={showNumber(value, 4)}
          ticks={[
            { at: 0, label: '0' },
            { at: 1, label: '1' },
          ]}
          onChange={onChange}
        />
        <NumberField
          label={`${label}, value`}
          value={value}
          check={check}
          onCommit={onChange}
          data-path={path}
        />
      </div>
      {closes ? (
        <p className="text-sm text-muted">
          Ends at <span className="figures">{showNumber(limit.to, 4)}</span>:{' '}
          {limit.toReason.replace(/\.$/, '')}.
        </p>
      ) : null}
    </div>
  );
}
