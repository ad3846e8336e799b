import { listSymbols } from '../schema/document-symbols';
import type { PresetDocument } from '../schema/preset';
import { isSymbol } from '../schema/symbols';
import type { Diagnostic } from './contract';
import { remark } from './remark';

/** Symbols that clash, cannot be read, or are missing altogether. */
export function checkSymbols(document: PresetDocument): readonly Diagnostic[] {
  const found: Diagnostic[] = [];
  if (document.populations.length === 0) {
    found.push(remark('error', ['populations'], 'The model has no population yet; add one to begin.'));
  }
  const seen = new Map<string, string>();
  for (const entry of listSymbols(document)) {
    const other = seen.get(entry.symbol);
    if (other !== undefined) {
      const message = `${entry.symbol} stands for both ${other} and ${entry.label}; rename one of them.`;
      found.push(remark('error', entry.path, message));
    } else seen.set(entry.symbol, entry.label);
    if (!isSymbol(entry.symbol)) {
      const message =
        entry.kind === 'trait value'
          ? `The value's symbol ${entry.symbol} is too long; shorten the symbol of the trait or of the class.`
          : `${entry.symbol} is a reserved name or cannot be a symbol; choose another.`;
      found.push(remark('error', entry.path, message));
    }
  }
  found.push(
    ...repeated(
      document.traits.map((trait) => trait.symbol),
      (k) => ['traits', k, 'symbol'],
      'trait',
    ),
  );
  found.push(
    ...repeated(
      document.processes.map((process) => process.id),
      (k) => ['processes', k, 'id'],
      'process',
    ),
  );
  return found;
}

function repeated(
  names: readonly string[],
  path: (k: number) => Diagnostic['path'],
  what: string,
): readonly Diagnostic[] {
  return names.flatMap((name, k) =>
    names.indexOf(name) === k
      ? []
      : [remark('error', path(k), `There is another ${what} called ${name}; rename one of them.`)],
  );
}
