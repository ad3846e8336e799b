import { NumberField } from '@/components/fields/number-field';
import { SelectField } from '@/components/fields/select-field';
import type { Tolerance } from '@/contract/assigned-sweeps';

const KINDS = [
  { value: 'absolute', label: 'in its unit' },
  { value: 'relative', label: 'per cent' },
] as const;

/** How far a value may lie off the reference and still agree; a relative one is typed in per cent. */
export function ToleranceFields({
  of,
  tolerance,
  onChange,
}: {
  readonly of: string;
  readonly tolerance: Tolerance;
  readonly onChange: (tolerance: Tolerance) => void;
}) {
  const scale = tolerance.kind === 'relative' ? 100 : 1;
  return (
    <div className="flex items-start gap-1.5">
      <NumberField
        label={`Tolerance of ${of}`}
        className="w-24"
        value={Number((tolerance.amount * scale).toPrecision(12))}
        check={(value) => (value >= 0 ? null : 'A tolerance is zero or more.')}
        onCommit={(value) => onChange({ ...tolerance, amount: Number((value / scale).toPrecision(12)) })}
      />
      <SelectField
        label={`Kind of tolerance of ${of}`}
        visibleLabel={false}
        className="w-28"
        value={tolerance.kind}
        choices={KINDS}
        onChange={(kind) => onChange({ ...tolerance, kind })}
      />
    </div>
  );
}
