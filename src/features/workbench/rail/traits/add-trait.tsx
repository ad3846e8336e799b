import { Plus } from 'lucide-react';
import { useState } from 'react';

import { CheckField } from '@/components/fields/check-field';
import { SelectField } from '@/components/fields/select-field';
import { Button } from '@/components/ui/button';
import { Popover } from '@/components/ui/popover';
import { LIMITS } from '@/engine/schema/limits';
import type { Population } from '@/engine/schema/preset';

import { useWorkbench } from '../../state/store';
import { COMMON_TRAITS, addTrait } from './common-traits';

function PopulationChoice(props: {
  readonly legend: string;
  readonly populations: readonly Population[];
  readonly chosen: readonly string[];
  readonly onChange: (chosen: readonly string[]) => void;
}) {
  const { legend, populations, chosen, onChange } = props;
  return (
    <fieldset className="grid gap-1">
      <legend className="mb-1 text-sm font-medium">{legend}</legend>
      {populations.map((one) => (
        <CheckField
          key={one.symbol}
          label={one.name || one.symbol}
          checked={chosen.includes(one.symbol)}
          onChange={(on) =>
            onChange(on ? [...chosen, one.symbol] : chosen.filter((symbol) => symbol !== one.symbol))
          }
        />
      ))}
    </fieldset>
  );
}

/** A trait of a common kind, or one's own, for the classes of chosen populations. */
export function AddTrait() {
  const populations = useWorkbench((state) => state.document.populations);
  const full = useWorkbench((state) => state.document.traits.length >= LIMITS.traits);
  const edit = useWorkbench((state) => state.edit);
  const [open, setOpen] = useState(false);
  const [key, setKey] = useState(COMMON_TRAITS[0]?.key ?? 'own');
  const [chosen, setChosen] = useState<readonly string[] | null>(null);
  const [towards, setTowards] = useState<readonly string[]>([]);
  const common = COMMON_TRAITS.find((one) => one.key === key);
  const split = populations.filter((one) => one.classes.length > 1).map((one) => one.symbol);
  const picked = chosen ?? (split.length > 0 ? split : populations.map((one) => one.symbol));
  const ready = picked.length > 0 && (common?.per !== 'pair' || towards.length > 0);

  const handleAdd = () => {
    if (!common || !ready) return;
    edit(`Add trait ${common.name.toLowerCase()}`, (document) =>
      addTrait(document, common, { populations: picked, towards }),
    );
    setOpen(false);
    setChosen(null);
    setTowards([]);
  };

  return (
    <Popover
      open={open}
      onOpenChange={setOpen}
      label="Add a trait"
      trigger={
        <Button look="quiet" size="small" disabled={populations.length === 0 || full}>
          <Plus size={14} aria-hidden /> Trait
        </Button>
      }
    >
      <form
        className="grid gap-3"
        onSubmit={(event) => {
          event.preventDefault();
          handleAdd();
        }}
      >
        <SelectField
          label="Trait"
          value={key}
          choices={COMMON_TRAITS.map((one) => ({ value: one.key, label: one.name }))}
          help={common?.meaning || 'Name, symbol and unit can be changed under its heading.'}
          onChange={setKey}
        />
        <PopulationChoice
          legend={common?.per === 'pair' ? 'Of the classes of' : 'For the classes of'}
          populations={populations}
          chosen={picked}
          onChange={setChosen}
        />
        {common?.per === 'pair' ? (
          <PopulationChoice
            legend="Towards the classes of"
            populations={populations}
            chosen={towards}
            onChange={setTowards}
          />
        ) : null}
        <Button type="submit" look="primary" size="small" disabled={!ready}>
          Add trait
        </Button>
      </form>
    </Popover>
  );
}
