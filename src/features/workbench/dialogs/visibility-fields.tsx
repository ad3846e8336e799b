import { useState } from 'react';

import { roleMay } from '@/contract/rights';
import { useSession } from '@/lib/session';

export interface Placement {
  readonly visibility: 'private' | 'lab';
  readonly labId: string | null;
}

export function usePlacement() {
  return useState<Placement>({ visibility: 'private', labId: null });
}

interface VisibilityFieldsProps {
  readonly value: Placement;
  readonly onChange: (value: Placement) => void;
  readonly disabled?: boolean;
}

/** Who may see a preset: its owner alone, or a lab. */
export function VisibilityFields({ value, onChange, disabled = false }: VisibilityFieldsProps) {
  const memberships = useSession().data?.user?.memberships ?? [];
  const option = (placement: Placement, label: string, help: string, allowed = true) => (
    <label key={`${placement.visibility}:${placement.labId ?? ''}`} className="flex items-start gap-2">
      <input
        type="radio"
        name="visibility"
        className="mt-1 accent-[var(--accent)]"
        disabled={disabled || !allowed}
        checked={
          value.visibility === placement.visibility &&
          (placement.visibility === 'private' || value.labId === placement.labId)
        }
        onChange={() => onChange(placement)}
      />
      <span>
        {label}
        <span className="block text-sm text-muted">{help}</span>
      </span>
    </label>
  );
  return (
    <fieldset className="grid gap-2">
      <legend className="mb-1 font-medium">Who may see it</legend>
      {option({ visibility: 'private', labId: null }, 'Only you', 'And those you give a link to.')}
      {memberships.map((one) => {
        const may = roleMay(one.role, 'create lab presets');
        return option(
          { visibility: 'lab', labId: one.labId },
          one.labName,
          may
            ? 'Every member may open it; supervisors and researchers may save versions.'
            : 'Your role in this lab does not include keeping presets in it.',
          may,
        );
      })}
    </fieldset>
  );
}
