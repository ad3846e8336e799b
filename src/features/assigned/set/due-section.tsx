import { useState } from 'react';

import { SelectField } from '@/components/fields/select-field';
import { FormField } from '@/components/ui/form-field';
import { describeDue, isPast } from '@/lib/due';

import { SetSection } from './set-section';
import type { SetPart } from './set-view';
import { fromWallTime, timeZones, toWallTime } from './zoned-time';

/** When it is due, on the clocks of a place. */
export function DueSection({ view, onChange }: Pick<SetPart, 'view' | 'onChange'>) {
  const { dueAt, timeZone } = view;
  const wall = dueAt ? toWallTime(dueAt, timeZone) : '';
  // Kept as it is typed: a field that is half filled holds no date, or one of the first century.
  const [typed, setTyped] = useState<string | null>(null);
  const handleWall = (value: string) => {
    setTyped(value);
    const instant = fromWallTime(value, timeZone);
    if (instant) onChange({ dueAt: instant, timeZone });
  };
  const handleBlur = () => {
    if (typed === '' && dueAt !== null) onChange({ dueAt: null });
    setTyped(null);
  };
  /** The clock stays where it was put; the instant moves with the zone. */
  const handleZone = (zone: string) =>
    onChange({ timeZone: zone, dueAt: wall ? fromWallTime(wall, zone) : null });
  return (
    <SetSection title="Due" note="Work handed in later is taken, and marked late.">
      <div className="flex flex-wrap items-start gap-3">
        <FormField
          label="Date and time"
          type="datetime-local"
          max="2999-12-31T23:59"
          className="w-60"
          value={typed ?? wall}
          onBlur={handleBlur}
          onChange={(event) => handleWall(event.target.value)}
          help={dueAt ? `${describeDue(dueAt)}${isPast(dueAt) ? ': this is past' : ''}` : undefined}
        />
        <SelectField
          label="Time zone"
          className="w-64 max-w-full"
          value={timeZone}
          choices={timeZones(timeZone).map((zone) => ({ value: zone, label: zone.replaceAll('_', ' ') }))}
          onChange={handleZone}
        />
      </div>
    </SetSection>
  );
}
