import { NumberField } from '@/components/fields/number-field';
import { SelectField } from '@/components/fields/select-field';

import { SetSection } from './set-section';
import type { SetPart } from './set-view';
import { firstRange, numberKeys } from './sweepable';

/** The parameter that is swept, and from where to where. */
export function SweepSection({ view, fixed, onChange }: SetPart) {
  const keys = numberKeys(view.document);
  const { parameter, from, to } = view.range;
  const handleParameter = (key: string) => {
    const chosen = keys.find((one) => one.key === key);
    if (chosen) onChange({ range: firstRange(view.document, chosen) });
  };
  return (
    <SetSection title="Sweep" note={fixed ? 'Fixed since the sweep was opened.' : undefined}>
      <div className="flex flex-wrap items-start gap-3">
        <SelectField
          label="Parameter"
          className="w-72 max-w-full"
          value={parameter}
          disabled={fixed}
          choices={keys.map(({ key, label }) => ({ value: key, label }))}
          onChange={handleParameter}
        />
        <NumberField
          label="From"
          visibleLabel
          className="w-32"
          value={from}
          disabled={fixed}
          check={(value) => (value < to ? null : 'The range must begin below its end.')}
          onCommit={(value) => onChange({ range: { parameter, from: value, to } })}
        />
        <NumberField
          label="To"
          visibleLabel
          className="w-32"
          value={to}
          disabled={fixed}
          check={(value) => (value > from ? null : 'The range must end above its beginning.')}
          onCommit={(value) => onChange({ range: { parameter, from, to: value } })}
        />
      </div>
    </SetSection>
  );
}
