import { useId, useState } from 'react';

import { FieldMessage } from '@/components/fields/field-message';
import { listClasses, type PlacedClass } from '@/engine/schema/document-symbols';
import type { PresetDocument, Trait } from '@/engine/schema/preset';

import { useWorkbench } from '../../state/store';
import { HueDot } from '../hue-dot';
import { classInWords } from './common-traits';
import { TraitCell } from './trait-cell';
import { TraitHeader } from './trait-header';

/** Classes of every population that stands in one place of a trait's pairs; all of them where it has none yet. */
function classesInSlot(document: PresetDocument, trait: Trait, slot: 0 | 1): readonly PlacedClass[] {
  const all = listClasses(document);
  const named = new Set(trait.entries.map((entry) => entry.of[slot]));
  const populations = new Set(
    all.filter((one) => named.has(one.class.symbol)).map((one) => one.population.symbol),
  );
  return populations.size === 0 ? all : all.filter((one) => populations.has(one.population.symbol));
}

function shortName(placed: PlacedClass): string {
  const { population } = placed;
  const own = placed.class.name || placed.class.symbol;
  return population.classes.length === 1 ? population.name || own : own;
}

const WORDS: Readonly<Record<string, string>> = {
  attack: 'consumer ↓ resource →',
  switching: 'from ↓ to →',
  competition: 'on ↓ by →',
};

/** A trait of pairs as a small matrix: the first class down, the second across. */
export function PairMatrix({ index }: { readonly index: number }) {
  const document = useWorkbench((state) => state.document);
  const messageId = useId();
  const [problem, setProblem] = useState<string | null>(null);
  const trait = document.traits[index];
  if (!trait) return null;
  const rows = classesInSlot(document, trait, 0);
  const columns = classesInSlot(document, trait, 1);
  const name = trait.name || trait.symbol;
  return (
    <div className="mt-2 overflow-x-auto border-t border-hairline pt-2">
      <table className="w-full border-collapse" aria-label={`${name} by pairs of classes`}>
        <caption className="text-left">
          <TraitHeader index={index} align="left" />
        </caption>
        <thead>
          <tr>
            <th scope="col" className="text-left text-xs font-normal text-muted">
              {WORDS[trait.role] ?? 'of ↓ with →'}
            </th>
            {columns.map((column) => (
              <th
                key={column.class.symbol}
                scope="col"
                className="min-w-16 px-1 text-right text-sm font-normal"
              >
                {shortName(column)}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map((row, r) => (
            <tr key={row.class.symbol}>
              <th scope="row" className="py-0.5 pr-2 text-left font-medium">
                <span className="flex items-center gap-1.5">
                  <HueDot population={row.population} of={row.class.symbol} />
                  <span className="max-w-32 truncate text-sm">{shortName(row)}</span>
                </span>
              </th>
              {columns.map((column, c) => (
                <td key={column.class.symbol} className="px-0.5 py-0.5">
                  <TraitCell
                    traitIndex={index}
                    of={[row.class.symbol, column.class.symbol]}
                    label={`${name} of ${classInWords(document, row.class.symbol)} on ${classInWords(document, column.class.symbol)}`}
                    row={r}
                    column={c}
                    marked={false}
                    messageId={messageId}
                    onProblem={setProblem}
                  />
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
      {problem ? <FieldMessage id={messageId}>{problem}</FieldMessage> : null}
    </div>
  );
}
