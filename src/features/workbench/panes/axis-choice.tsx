import type { Quantity } from '@/engine/schema/preset';
import type { NamedQuantity } from '@/graphics/quantities';

interface AxisChoiceProps {
  readonly label: string;
  readonly value: Quantity;
  readonly choices: readonly NamedQuantity[];
  readonly onChange: (next: Quantity) => void;
  readonly allowLogarithm?: boolean;
}

const keyOf = (quantity: Quantity) => `${quantity.quantity}:${quantity.of}`;

/** What lies on one axis, and whether its logarithm. */
export function AxisChoice({ label, value, choices, onChange, allowLogarithm = true }: AxisChoiceProps) {
  return (
    <span className="flex items-center gap-1.5">
      <label className="flex items-center gap-1 text-sm text-muted">
        {label}
        <select
          className="max-w-[min(15rem,60vw)] rounded border bg-raised px-1 py-0.5 text-ink"
          value={keyOf(value)}
          onChange={(event) => {
            const chosen = choices.find((one) => keyOf(one.quantity) === event.target.value);
            if (chosen) onChange({ ...chosen.quantity, logarithm: value.logarithm });
          }}
        >
          {choices.map((one) => (
            <option key={keyOf(one.quantity)} value={keyOf(one.quantity)}>
              {one.name}
            </option>
          ))}
        </select>
      </label>
      {allowLogarithm ? (
        <label className="flex items-center gap-1 text-sm text-muted">
          <input
            type="checkbox"
            className="accent-(--accent)"
            checked={value.logarithm}
            onChange={(event) => onChange({ ...value, logarithm: event.target.checked })}
          />
          log
          <span className="sr-only"> of {label}</span>
        </label>
      ) : null}
    </span>
  );
}
