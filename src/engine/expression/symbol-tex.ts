import { SYMBOL_PATTERN } from '../schema/symbols';

const GREEK: ReadonlySet<string> = new Set(
  (
    'alpha beta gamma delta epsilon zeta eta theta iota kappa lambda mu nu xi pi rho sigma tau upsilon phi chi ' +
    'psi omega Gamma Delta Theta Lambda Xi Pi Sigma Upsilon Phi Psi Omega'
  ).split(' '),
);

/**
 * TeX of a symbol: letters and digits only inside braces of ours, so that no name can form a macro.
 * The part before the first underscore is the name (a Greek letter spelt out becomes that letter,
 * trailing digits a subscript, several letters an upright word), the others are subscripts:
 * `m_y1` -> m_{y1}, `a_y1_x` -> a_{y1,\,x}, `alpha` -> \alpha. Text that is no symbol gives a question mark.
 */
export function symbolToTex(symbol: string): string {
  if (!SYMBOL_PATTERN.test(symbol)) return '\\mathrm{?}';
  const [first = '', ...rest] = symbol.split('_');
  const match = /^([A-Za-z]+)(\d+)$/.exec(first);
  const stem = match?.[1] ?? first;
  const digits = match?.[2];
  const subscripts = rest.map(subscriptToTex);
  if (digits !== undefined) subscripts.unshift(digits);
  const base = wordToTex(stem);
  return subscripts.length === 0 ? base : `${base}_{${subscripts.join(',\\,')}}`;
}

function wordToTex(word: string): string {
  if (GREEK.has(word)) return `\\${word}`;
  return word.length === 1 ? word : `\\mathrm{${word}}`;
}

function subscriptToTex(part: string): string {
  if (part === '') return '\\_';
  if (GREEK.has(part)) return `\\${part}`;
  return part.length === 1 || /^[A-Za-z]?\d+$/.test(part) ? part : `\\mathrm{${part}}`;
}
