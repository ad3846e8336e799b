import { symbolsOf } from '../expression/index';
import type { PresetDocument } from '../schema/preset';
import { TIME_SYMBOL, traitEntrySymbol } from '../schema/symbols';
import type { Diagnostic } from './contract';
import { parseCached } from './model-graph';
import { remark } from './remark';

/** What is defined and never read, and what reads the time. */
export function checkUse(document: PresetDocument): readonly Diagnostic[] {
  const found: Diagnostic[] = [];
  const used = new Set<string>();
  const read = (text: string): readonly string[] => {
    const result = parseCached(text);
    const names = result.ok ? symbolsOf(result.tree) : [];
    for (const name of names) used.add(name);
    return names;
  };
  const timed: Diagnostic['path'][] = [];
  document.processes.forEach((process, k) => {
    const paths: (readonly [string, Diagnostic['path']])[] = [
      [process.rate, ['processes', k, 'rate']],
      ...process.effects.map(
        (effect, j) => [effect.amount, ['processes', k, 'effects', j, 'amount']] as const,
      ),
    ];
    for (const [text, path] of paths) if (read(text).includes(TIME_SYMBOL)) timed.push(path);
  });
  document.intermediates.forEach((entry, k) => {
    if (read(entry.formula).includes(TIME_SYMBOL)) timed.push(['intermediates', k, 'formula']);
  });
  document.constantsOfMotion.forEach(read);
  const [first] = timed;
  if (first !== undefined) {
    const message =
      'This formula contains the time t: nothing rests, so that fixed points of the period map, swept along a parameter, take the place of equilibria, and there is no verdict on them.';
    found.push(remark('note', first, message));
  }
  document.parameters.forEach((parameter, k) => {
    if (!used.has(parameter.symbol)) found.push(unused(['parameters', k], parameter.symbol));
  });
  document.traits.forEach((trait, k) => {
    const entries = trait.entries.map((entry) => traitEntrySymbol(trait.symbol, entry.of));
    if (!entries.some((symbol) => used.has(symbol)))
      found.push(unused(['traits', k], trait.name || trait.symbol));
  });
  document.intermediates.forEach((entry, k) => {
    if (!used.has(entry.symbol)) found.push(unused(['intermediates', k], entry.symbol));
  });
  return found;
}

function unused(path: Diagnostic['path'], name: string): Diagnostic {
  return remark('note', path, `No formula reads ${name}.`);
}
