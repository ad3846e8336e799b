import { Plus } from 'lucide-react';
import { useState } from 'react';

import { TextField } from '@/components/fields/text-field';
import { Button } from '@/components/ui/button';
import { addPopulation } from '@/engine/schema/edit';

import { HueDot } from '../rail/hue-dot';
import { useWorkbench } from '../state/store';

/** Names a population and adds it under a symbol made of its first letter. */
export function NewPopulation() {
  const populations = useWorkbench((state) => state.document.populations);
  const edit = useWorkbench((state) => state.edit);
  const [name, setName] = useState('');
  const wanted = /[A-Za-z]/.exec(name)?.[0]?.toUpperCase() ?? 'N';
  return (
    <>
      {populations.length > 0 ? (
        <ul className="flex flex-wrap gap-x-4 gap-y-1">
          {populations.map((one) => (
            <li key={one.symbol} className="flex items-center gap-1.5">
              <HueDot population={one} /> {one.name || one.symbol}
              <span className="figures text-sm text-muted italic">{one.symbol}</span>
            </li>
          ))}
        </ul>
      ) : null}
      <form
        className="flex items-end gap-2"
        onSubmit={(event) => {
          event.preventDefault();
          if (name.trim() === '') return;
          edit(`Add population ${name.trim()}`, (document) => addPopulation(document, name.trim(), wanted));
          setName('');
        }}
      >
        <TextField
          live
          className="flex-1"
          label="Name of the population"
          placeholder={populations.length === 0 ? 'Springtails' : 'Another population'}
          value={name}
          maxLength={120}
          onCommit={setName}
        />
        <Button type="submit" size="small" className="min-h-8" disabled={name.trim() === ''}>
          <Plus size={14} aria-hidden /> Add
        </Button>
      </form>
    </>
  );
}
