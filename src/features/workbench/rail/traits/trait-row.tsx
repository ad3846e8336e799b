import { useCallback, useId, useState } from 'react';

import { FieldMessage } from '@/components/fields/field-message';
import type { PopulationClass, Population } from '@/engine/schema/preset';

import { useWorkbench } from '../../state/store';
import { HueDot } from '../hue-dot';
import { classInWords } from './common-traits';
import { findWrongSums } from './share-sums';
import { TraitCell } from './trait-cell';

interface TraitRowProps {
  readonly population: Population;
  readonly entry: PopulationClass;
  readonly alone: boolean;
  readonly row: number;
  /** Indices of the traits across. */
  readonly traits: readonly number[];
}

/** One class of the trait table; what is wrong with a cell stands in a line of its own beneath. */
export function TraitRow({ population, entry, alone, row, traits }: TraitRowProps) {
  const document = useWorkbench((state) => state.document);
  const messageId = useId();
  const [problems, setProblems] = useState<Readonly<Record<number, string>>>({});
  const name = alone ? population.name || entry.name || entry.symbol : entry.name || entry.symbol;
  const told = Object.entries(problems);
  return (
    <>
      <tr>
        <th scope="row" className="sticky left-0 z-10 bg-panel py-0.5 pr-2 text-left font-medium">
          <span className={alone ? 'flex items-center gap-1.5' : 'flex items-center gap-1.5 pl-3'}>
            <HueDot population={population} of={entry.symbol} />
            <span className="max-w-32 truncate text-sm" title={`${name}, ${entry.symbol}`}>
              {name}
            </span>
          </span>
        </th>
        {traits.map((index, column) => {
          const trait = document.traits[index];
          if (!trait) return null;
          const marked = findWrongSums(document, trait).some((one) => one.classes.includes(entry.symbol));
          return (
            <td key={trait.symbol} className="px-0.5 py-0.5">
              <Cell
                index={index}
                of={entry.symbol}
                label={`${trait.name || trait.symbol} of ${classInWords(document, entry.symbol)}`}
                row={row}
                column={column}
                marked={marked}
                messageId={messageId}
                setProblems={setProblems}
              />
            </td>
          );
        })}
      </tr>
      {told.length > 0 ? (
        <tr>
          <td colSpan={traits.length + 1} className="pb-1" id={messageId}>
            {told.map(([index, problem]) => (
              <FieldMessage key={index}>
                {document.traits[Number(index)]?.name}: {problem}
              </FieldMessage>
            ))}
          </td>
        </tr>
      ) : null}
    </>
  );
}

interface CellProps {
  readonly index: number;
  readonly of: string;
  readonly label: string;
  readonly row: number;
  readonly column: number;
  readonly marked: boolean;
  readonly messageId: string;
  readonly setProblems: (
    change: (before: Readonly<Record<number, string>>) => Readonly<Record<number, string>>,
  ) => void;
}

function Cell({ index, of, setProblems, ...rest }: CellProps) {
  const handleProblem = useCallback(
    (problem: string | null) =>
      setProblems((before) => {
        if ((before[index] ?? null) === problem) return before;
        const { [index]: _gone, ...others } = before;
        return problem === null ? others : { ...others, [index]: problem };
      }),
    [index, setProblems],
  );
  return <TraitCell traitIndex={index} of={[of]} onProblem={handleProblem} {...rest} />;
}
