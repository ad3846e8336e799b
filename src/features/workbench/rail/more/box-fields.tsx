import { NumberField } from '@/components/fields/number-field';
import { listClasses } from '@/engine/schema/document-symbols';
import type { PresetDocument } from '@/engine/schema/preset';

import { useWorkbench } from '../../state/store';

type Side = 'from' | 'to';

function setSide(
  document: PresetDocument,
  symbol: string,
  patch: Partial<Record<Side, number>>,
): PresetDocument {
  const known = document.box.find((one) => one.class === symbol);
  const start = listClasses(document).find((one) => one.class.symbol === symbol)?.class.start ?? 1;
  const before = known ?? { class: symbol, from: 0, to: Math.max(1, 10 * Math.abs(start)) };
  const next = { ...before, ...patch };
  return {
    ...document,
    box: known ? document.box.map((one) => (one.class === symbol ? next : one)) : [...document.box, next],
  };
}

/** Where equilibria are sought; an empty row gets a box from the start values. */
export function BoxFields() {
  const document = useWorkbench((state) => state.document);
  const edit = useWorkbench((state) => state.edit);
  const classes = listClasses(document);
  if (classes.length === 0) return null;
  const clear = (symbol: string) =>
    edit(`Box of ${symbol}`, (before) => ({
      ...before,
      box: before.box.filter((one) => one.class !== symbol),
    }));
  const set = (symbol: string, patch: Partial<Record<Side, number>>) =>
    edit(`Box of ${symbol}`, (before) => setSide(before, symbol, patch));
  return (
    <fieldset className="grid gap-1">
      <legend className="mb-1 text-sm font-medium">Box in which equilibria are sought</legend>
      {classes.map(({ class: entry }) => {
        const side = document.box.find((one) => one.class === entry.symbol);
        const name = entry.name || entry.symbol;
        return (
          <div key={entry.symbol} className="grid grid-cols-[minmax(0,1fr)_5rem_5rem] items-start gap-2">
            <span className="truncate pt-1 text-sm">{name}</span>
            <NumberField
              label={`Box of ${name}, from`}
              placeholder="chosen"
              value={side?.from ?? null}
              check={(value) => (side && value >= side.to ? 'It must begin below its end.' : null)}
              onCommit={(from) => set(entry.symbol, { from })}
              onClear={() => clear(entry.symbol)}
            />
            <NumberField
              label={`Box of ${name}, to`}
              placeholder="chosen"
              value={side?.to ?? null}
              check={(value) => (value <= (side?.from ?? 0) ? 'It must end above its beginning.' : null)}
              onCommit={(to) => set(entry.symbol, { to })}
              onClear={() => clear(entry.symbol)}
            />
          </div>
        );
      })}
    </fieldset>
  );
}
