import { Trash2 } from 'lucide-react';

import { CheckField } from '@/components/fields/check-field';
import { NumberField } from '@/components/fields/number-field';
import { SelectField, type Choice } from '@/components/fields/select-field';
import { TextField } from '@/components/fields/text-field';
import { Button } from '@/components/ui/button';
import type { Trait, TraitRole } from '@/engine/schema/preset';

import { useWorkbench } from '../../state/store';
import { useRename } from '../use-rename';
import { changeTrait, removeTrait } from './trait-edits';

const ROLES: readonly Choice<TraitRole>[] = [
  { value: 'mortality', label: 'Mortality' },
  { value: 'attack', label: 'Attack rate' },
  { value: 'handling', label: 'Handling time' },
  { value: 'share-of-births', label: 'Share of births' },
  { value: 'birth', label: 'Birth rate' },
  { value: 'maturation', label: 'Maturation' },
  { value: 'switching', label: 'Switching' },
  { value: 'harvest', label: 'Harvest' },
  { value: 'competition', label: 'Competition' },
  { value: 'other', label: 'Other' },
];
const DOMAINS: readonly Choice<Trait['domain']>[] = [
  { value: 'rate', label: 'A rate, 0 or more' },
  { value: 'share', label: 'A share, 0 to 1' },
  { value: 'positive', label: 'Above 0' },
  { value: 'any', label: 'Any number' },
];
const MEANS: readonly Choice<Trait['mean']>[] = [
  { value: 'arithmetic', label: 'Arithmetic' },
  { value: 'geometric', label: 'Geometric' },
  { value: 'harmonic', label: 'Harmonic' },
];

export function TraitSettings({ index, onClose }: { readonly index: number; readonly onClose: () => void }) {
  const trait = useWorkbench((state) => state.document.traits[index]);
  const edit = useWorkbench((state) => state.edit);
  const rename = useRename();
  if (!trait) return null;
  const name = trait.name || trait.symbol;
  const change = (what: string, patch: Partial<Omit<Trait, 'symbol' | 'entries'>>, merge?: string) =>
    edit(`${what} of ${name}`, (document) => changeTrait(document, index, patch), merge);
  return (
    <div className="grid grid-cols-2 gap-3">
      <TextField
        visibleLabel
        live
        label="Name"
        value={trait.name}
        maxLength={120}
        onCommit={(value) => change('Name', { name: value }, `trait-name:${index}`)}
      />
      <TextField
        visibleLabel
        label="Symbol"
        inputClassName="figures"
        value={trait.symbol}
        onCommit={(value) => rename(trait.symbol, value)}
      />
      <TextField
        visibleLabel
        live
        label="Unit"
        value={trait.unit}
        maxLength={60}
        onCommit={(unit) => change('Unit', { unit }, `trait-unit:${index}`)}
      />
      <SelectField
        label="Role"
        value={trait.role}
        choices={ROLES}
        onChange={(role) => change('Role', { role })}
      />
      <TextField
        visibleLabel
        live
        className="col-span-2"
        label="Meaning"
        value={trait.meaning}
        maxLength={500}
        onCommit={(meaning) => change('Meaning', { meaning }, `trait-meaning:${index}`)}
      />
      <SelectField
        label="Values"
        value={trait.domain}
        choices={DOMAINS}
        onChange={(domain) => change('Values', { domain })}
      />
      <SelectField
        label="Mean held"
        value={trait.mean}
        choices={MEANS}
        onChange={(mean) => change('Mean', { mean })}
      />
      <NumberField
        visibleLabel
        label="Own dial"
        value={trait.dial}
        onCommit={(dial) => change('Own dial', { dial })}
      />
      <CheckField
        className="self-end pb-1"
        label="Follows the spread"
        checked={trait.followsSpread}
        onChange={(followsSpread) => change('Following the spread', { followsSpread })}
      />
      <p className="col-span-2 text-sm text-muted">
        The own dial multiplies the spread: 1 as entered, 0 pooled, below 0 reversed. The chosen mean is held
        while classes are pooled.
      </p>
      <div className="col-span-2 flex justify-between">
        <Button
          look="caution"
          size="small"
          onClick={() => {
            edit(`Delete trait ${name}`, (document) => removeTrait(document, index));
            onClose();
          }}
        >
          <Trash2 size={14} aria-hidden /> Delete trait
        </Button>
        <Button size="small" onClick={onClose}>
          Done
        </Button>
      </div>
    </div>
  );
}
