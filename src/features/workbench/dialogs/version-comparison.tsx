import { useQuery } from '@tanstack/react-query';

import { FieldMessage } from '@/components/fields/field-message';
import { SelectField } from '@/components/fields/select-field';
import type { PresetDocument } from '@/engine/schema/preset';

import { useWorkbench } from '../state/store';
import { fetchVersion } from './api/fetch-version';
import { DifferenceTable } from './difference-table';
import { errorWords } from './error-words';
import type { Side } from './history-dialog';

function nameOf(side: Side): string {
  return side === 'bench' ? 'On the bench' : `Version ${side}`;
}

function useSide(id: string, side: Side) {
  const bench = useWorkbench((state) => state.document);
  const version = useQuery({
    queryKey: ['version', id, side],
    queryFn: () => fetchVersion(id, Number(side)),
    enabled: side !== 'bench',
    staleTime: Infinity,
  });
  const document: PresetDocument | null = side === 'bench' ? bench : (version.data?.document ?? null);
  return { document, error: side === 'bench' ? null : version.error };
}

interface VersionComparisonProps {
  readonly id: string;
  readonly before: Side;
  readonly after: Side;
  readonly choices: readonly Side[];
  readonly onBefore: (side: Side) => void;
  readonly onAfter: (side: Side) => void;
}

/** Two versions (or one and the bench) trait by trait. */
export function VersionComparison({ id, before, after, choices, onBefore, onAfter }: VersionComparisonProps) {
  const left = useSide(id, before);
  const right = useSide(id, after);
  const options = choices.map((side) => ({ value: String(side), label: nameOf(side) }));
  const read = (value: string): Side => (value === 'bench' ? 'bench' : Number(value));
  const error = left.error ?? right.error;
  return (
    <section aria-label="Comparison" className="mt-4 grid gap-3 border-t border-hairline pt-4">
      <div className="flex flex-wrap items-end gap-3">
        <SelectField
          className="w-40"
          label="Compare"
          value={String(before)}
          choices={options}
          onChange={(value) => onBefore(read(value))}
        />
        <SelectField
          className="w-40"
          label="with"
          value={String(after)}
          choices={options}
          onChange={(value) => onAfter(read(value))}
        />
      </div>
      {error ? (
        <FieldMessage>{errorWords(error)}</FieldMessage>
      ) : left.document && right.document ? (
        <DifferenceTable
          before={left.document}
          after={right.document}
          beforeName={nameOf(before)}
          afterName={nameOf(after)}
        />
      ) : (
        <p role="status">Reading the versions…</p>
      )}
    </section>
  );
}
