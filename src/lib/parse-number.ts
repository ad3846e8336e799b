export type ParsedNumber = { readonly value: number } | { readonly problem: string };

const MINUS = /[\u2212\u2013]/g;
const SPACES = /[\s\u00a0\u2009\u202f]/g;
const GROUPED = /^\d{1,3}([.,])\d{3}(\1\d{3})*$/;

function problem(text: string): ParsedNumber {
  return { problem: text };
}

/** Decides which of points and commas is the decimal mark; null where both readings are possible. */
function withPoint(digits: string): string | null {
  const points = digits.split('.').length - 1;
  const commas = digits.split(',').length - 1;
  if (commas === 0) return points > 1 ? (GROUPED.test(digits) ? digits.replaceAll('.', '') : null) : digits;
  if (points === 0) {
    if (commas > 1) return GROUPED.test(digits) ? digits.replaceAll(',', '') : null;
    const [whole = '', fraction = ''] = digits.split(',');
    // 1,234 may be read either way; 0,234 and 1,23 cannot be a grouped thousand.
    if (fraction.length === 3 && /^[1-9]\d{0,2}$/.test(whole)) return null;
    return digits.replace(',', '.');
  }
  const decimal = digits.lastIndexOf(',') > digits.lastIndexOf('.') ? ',' : '.';
  const grouping = decimal === ',' ? '.' : ',';
  const [whole = '', fraction = '', ...more] = digits.split(decimal);
  if (more.length > 0 || fraction.includes(grouping)) return null;
  if (!new RegExp(`^\\d{1,3}(\\${grouping}\\d{3})+$`).test(whole)) return null;
  return `${whole.replaceAll(grouping, '')}.${fraction}`;
}

/**
 * Reads a typed number: `0.001`, `0,001`, `1e-3`, `1 200`, with a hyphen or a true minus. Where a comma
 * could be a decimal mark as well as a mark of thousands, it asks instead of guessing.
 */
export function parseNumber(typed: string): ParsedNumber {
  const text = typed.replace(MINUS, '-').trim();
  if (text === '') return problem('A number is needed here.');
  if (text.endsWith('%')) {
    const inner = parseNumber(text.slice(0, -1));
    return 'value' in inner
      ? problem(`Write ${showNumber(inner.value / 100)} instead of a percentage.`)
      : inner;
  }
  const shape = /^([+-]?)([\d.,\s\u00a0\u2009\u202f]+)(?:[eE]([+-]?\d+))?$/.exec(text);
  if (!shape) return problem(`“${typed.trim()}” is not a number. Write it like 0.25 or 1e-3.`);
  const [, sign = '', body = '', exponent] = shape;
  const trimmed = body.trim();
  if (SPACES.test(trimmed) && !/^\d{1,3}([\s\u00a0\u2009\u202f]\d{3})+([.,]\d+)?$/.test(trimmed))
    return problem('There is a space inside this number. Write it without.');
  const digits = trimmed.replace(SPACES, '');
  if (!/\d/.test(digits)) return problem(`“${typed.trim()}” is not a number. Write it like 0.25 or 1e-3.`);
  const plain = withPoint(digits);
  if (plain === null) {
    const asPoint = digits.replace(',', '.');
    const asWhole = digits.replace(/[.,]/g, '');
    return problem(
      /^\d+\.\d+$/.test(asPoint)
        ? `This could mean ${asPoint} or ${asWhole}. Write it with a point, or without the comma.`
        : 'The points and commas of this number do not fit together. Write it like 1234.5.',
    );
  }
  const value = Number(`${sign}${plain}${exponent === undefined ? '' : `e${exponent}`}`);
  if (!Number.isFinite(value)) return problem('This number is too large to compute with.');
  return { value };
}

/** Shortest text of a number, free of rounding dust (0.1 + 0.2), with a true minus. */
export function showNumber(value: number, digits = 12): string {
  if (!Number.isFinite(value)) return value === 0 ? '0' : String(value).replace('-', '\u2212');
  const rounded = Number(value.toPrecision(digits));
  const size = Math.abs(rounded);
  const text =
    size !== 0 && (size < 1e-4 || size >= 1e7) ? rounded.toExponential().replace('e+', 'e') : String(rounded);
  return text.replaceAll('-', '\u2212');
}
