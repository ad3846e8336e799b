import { useState } from 'react';

import { SelectField } from '@/components/fields/select-field';
import { TextField } from '@/components/fields/text-field';
import { Button } from '@/components/ui/button';
import { addClass } from '@/engine/schema/edit';
import { LIMITS } from '@/engine/schema/limits';
import type { PresetDocument } from '@/engine/schema/preset';

import { useWorkbench } from '../state/store';

/** Names of classes as typed, separated by commas. */
export function readClassNames(text: string): readonly string[] {
  return [
    ...new Set(
      text
        .split(',')
        .map((name) => name.trim())
        .filter(Boolean),
    ),
  ];
}

/** Splits a population into classes of these names: those it has are renamed, further ones are added. */
export function nameClasses(
  document: PresetDocument,
  population: string,
  names: readonly string[],
): PresetDocument {
  let next = document;
  const count = document.populations.find((one) => one.symbol === population)?.classes.length ?? 0;
  for (const name of names.slice(count)) next = addClass(next, population, name);
  return {
    ...next,
    populations: next.populations.map((one) =>
      one.symbol === population
        ? { ...one, classes: one.classes.map((entry, k) => ({ ...entry, name: names[k] ?? entry.name })) }
        : one,
    ),
  };
}

export function ClassNames() {
  const populations = useWorkbench((state) => state.document.populations);
  const edit = useWorkbench((state) => state.edit);
  const [chosen, setChosen] = useState<string | null>(null);
  const [text, setText] = useState('');
  const population = populations.find((one) => one.symbol === chosen) ?? populations.at(-1);
  if (!population) return null;
  const names = readClassNames(text);
  const all = populations.reduce((count, one) => count + one.classes.length, 0) - population.classes.length;
  const tooMany =
    names.length > LIMITS.classesPerPopulation || all + names.length > LIMITS.classes
      ? `A population holds at most ${LIMITS.classesPerPopulation} classes, a model ${LIMITS.classes}.`
      : undefined;
  const handleSplit = () => {
    if (names.length < 2 || tooMany) return;
    edit(`Split ${population.name || population.symbol}`, (document) =>
      nameClasses(document, population.symbol, names),
    );
    setText('');
  };
  return (
    <form
      className="grid grid-cols-[10rem_minmax(0,1fr)_auto] items-start gap-2"
      onSubmit={(event) => {
        event.preventDefault();
        handleSplit();
      }}
    >
      <SelectField
        label="Population to split"
        visibleLabel={false}
        value={population.symbol}
        choices={populations.map((one) => ({ value: one.symbol, label: one.name || one.symbol }))}
        onChange={setChosen}
      />
      <TextField
        live
        label="Names of its classes, separated by commas"
        placeholder="males, females"
        value={text}
        error={tooMany}
        onCommit={setText}
      />
      <Button
        type="submit"
        size="small"
        className="min-h-8"
        disabled={names.length < 2 || tooMany !== undefined}
      >
        Split
      </Button>
    </form>
  );
}
