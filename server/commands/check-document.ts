import { parseFormula } from '@/engine/expression';
import { LIMITS } from '@/engine/schema/limits';
import type { PresetDocument } from '@/engine/schema/preset';

import { refuseInvalid, refuseTooLarge } from '../errors';

/** Every formula of a document with its place, as far as it can be malformed. */
function* formulasOf(document: PresetDocument): Generator<readonly [string, string]> {
  for (const [i, one] of document.intermediates.entries()) yield [`intermediates.${i}.formula`, one.formula];
  for (const [i, one] of document.processes.entries()) {
    yield [`processes.${i}.rate`, one.rate];
    for (const [j, effect] of one.effects.entries())
      yield [`processes.${i}.effects.${j}.amount`, effect.amount];
  }
  for (const [i, one] of document.constantsOfMotion.entries()) yield [`constantsOfMotion.${i}`, one];
}

/** The document as text to be stored; refuses one that is too large or has a formula that cannot be read. */
export function checkDocument(document: PresetDocument): string {
  const text = JSON.stringify(document);
  if (Buffer.byteLength(text) > LIMITS.documentBytes) {
    throw refuseTooLarge(
      `A document has at most ${LIMITS.documentBytes / 1024} kB, so this one was not saved. Shorten its notes or split it.`,
    );
  }
  const fields: Record<string, string> = {};
  for (const [place, formula] of formulasOf(document)) {
    if (formula.trim() === '') continue;
    const parsed = parseFormula(formula);
    if (!parsed.ok) fields[`document.${place}`] = parsed.failure.message;
  }
  if (Object.keys(fields).length > 0) {
    throw refuseInvalid(
      fields,
      'A formula of this model cannot be read, so it was not saved. It is marked in the workbench.',
    );
  }
  return text;
}
