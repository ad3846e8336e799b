import { NumberField } from '@/components/fields/number-field';
import { SelectField } from '@/components/fields/select-field';
import { TextAreaField } from '@/components/fields/text-area-field';
import { ASSIGNED_LIMITS, type GivenFinding, type WantedFinding } from '@/contract/assigned-sweeps';
import { formatNumber } from '@/graphics/numbers';

import { givenFor, withFinding } from '../state/assigned';
import { useWorkbench, useWorkbenchStore } from '../state/store';
import { candidatesOf, pinFinding } from './pin-finding';

const MODEL = { split: 'split', twin: 'pooled' } as const;

/** What is asked for, in a few words under its label. */
export function wantedWords(wanted: WantedFinding): string {
  if (wanted.kind === 'special point') return `${wanted.point}, ${MODEL[wanted.of]} model`;
  if (wanted.kind === 'number') return wanted.unit ? `a number (${wanted.unit})` : 'a number';
  return 'a reading in words';
}

/** The points of the sweep on show, to be given as the answer. */
function PointChoice({ wanted, given }: { readonly wanted: WantedFinding; readonly given: GivenFinding }) {
  const store = useWorkbenchStore();
  const sweep = useWorkbench((state) => state.sweep);
  const cycles = useWorkbench((state) => state.cycles);
  const points = candidatesOf({ sweep, cycles });
  if (points.length === 0)
    return <p className="text-sm text-muted">Run the sweep to pin one of its points, or type a value.</p>;
  const chosen = points.findIndex(
    (one) => one.kind === given.pin?.kind && one.of === given.pin.of && one.parameter === given.pin.parameter,
  );
  return (
    <SelectField
      label={`Take “${wanted.label}” from the sweep`}
      visibleLabel={false}
      value={chosen < 0 ? '' : String(chosen)}
      choices={[
        { value: '', label: 'Take from the sweep…' },
        ...points.map((one, index) => ({
          value: String(index),
          label: `${one.kind} at ${formatNumber(one.parameter, 5)}, ${MODEL[one.of]}`,
        })),
      ]}
      onChange={(value) => {
        const point = points[Number(value)];
        if (value !== '' && point) pinFinding(store, wanted.id, point);
      }}
    />
  );
}

/** One finding that is wanted, and what is given for it. */
export function FindingField({ wanted }: { readonly wanted: WantedFinding }) {
  const store = useWorkbenchStore();
  const findings = useWorkbench((state) => state.assigned?.findings ?? []);
  const given = givenFor(findings, wanted.id);
  const change = (patch: Partial<GivenFinding>) => {
    const { assigned, set } = store.getState();
    if (!assigned) return;
    const next = { ...givenFor(assigned.findings, wanted.id), ...patch };
    set({ assigned: { ...assigned, findings: withFinding(assigned.findings, next) } });
  };
  const reading = wanted.kind === 'reading';
  return (
    <li className="grid gap-1.5 py-2">
      <div className="flex flex-wrap items-baseline justify-between gap-x-2">
        <span className="font-medium">{wanted.label}</span>
        <span className="text-sm text-muted">{wantedWords(wanted)}</span>
      </div>
      {reading ? null : (
        <div className="flex flex-wrap items-start gap-2">
          <NumberField
            label={`Value of “${wanted.label}”`}
            placeholder="value"
            className="w-32"
            value={given.value}
            onCommit={(value) => change({ value, pin: null })}
            onClear={() => change({ value: null, pin: null })}
          />
          {given.pin ? (
            <span className="pt-0.5 text-sm text-accent">
              pinned: {given.pin.kind}, {MODEL[given.pin.of]}
            </span>
          ) : given.value === null ? null : (
            <span className="pt-0.5 text-sm text-muted">typed</span>
          )}
        </div>
      )}
      {wanted.kind === 'special point' ? <PointChoice wanted={wanted} given={given} /> : null}
      <TextAreaField
        label={reading ? wanted.label : `Note on “${wanted.label}”`}
        visibleLabel={false}
        rows={reading ? 4 : 1}
        maxLength={ASSIGNED_LIMITS.textLength}
        placeholder={reading ? 'What you read in it' : 'Note, if any'}
        value={given.text}
        onChange={(text) => change({ text })}
      />
    </li>
  );
}
