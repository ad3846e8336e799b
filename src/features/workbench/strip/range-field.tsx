import { useId, useState } from 'react';

import { parseNumber, showNumber } from '@/lib/parse-number';

interface RangeFieldProps {
  readonly label: string;
  readonly value: number;
  /** Part of an assigned sweep that was set. */
  readonly locked?: boolean;
  /** Says what is wrong with a number, or null. */
  readonly check: (value: number) => string | null;
  readonly onChange: (value: number) => void;
}

/** One end of the range: what was typed stays until it is a number that fits. */
export function RangeField({ label, value, locked = false, check, onChange }: RangeFieldProps) {
  const id = useId();
  const [typed, setTyped] = useState<string | null>(null);
  const parsed = typed === null ? null : parseNumber(typed);
  const problem = parsed === null ? null : 'problem' in parsed ? parsed.problem : check(parsed.value);
  function settle() {
    if (parsed && 'value' in parsed && !problem) {
      if (parsed.value !== value) onChange(parsed.value);
      setTyped(null);
    }
  }
  return (
    <span className="relative inline-flex items-center gap-1 text-sm text-muted">
      <label htmlFor={id}>{label}</label>
      <input
        id={id}
        inputMode="decimal"
        className="figures w-20 rounded border bg-raised px-1.5 py-0.5 text-ink read-only:border-dashed read-only:text-muted aria-invalid:border-caution"
        readOnly={locked}
        title={locked ? 'The range is part of what was set.' : undefined}
        value={typed ?? showNumber(value, 6)}
        aria-invalid={problem ? true : undefined}
        aria-describedby={problem ? `${id}-problem` : undefined}
        onChange={(event) => setTyped(event.target.value)}
        onBlur={settle}
        onKeyDown={(event) => {
          if (event.key === 'Enter') settle();
          else if (event.key === 'Escape') setTyped(null);
        }}
      />
      {problem ? (
        <span
          id={`${id}-problem`}
          role="alert"
          className="absolute bottom-full left-0 z-10 mb-1 w-56 rounded border border-caution bg-raised px-2 py-1 text-caution"
        >
          {problem}
        </span>
      ) : null}
    </span>
  );
}
