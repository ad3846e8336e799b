/** Numbers for people: significant digits, true minus signs, powers of ten written out. */

const MINUS = '\u2212';
const ROUNDING_DUST = 1e-12;
const SUPERSCRIPTS = '⁰¹²³⁴⁵⁶⁷⁸⁹';

function superscript(exponent: number): string {
  const digits = String(Math.abs(exponent)).replace(/\d/g, (digit) => SUPERSCRIPTS[Number(digit)] ?? digit);
  return exponent < 0 ? `⁻${digits}` : digits;
}

/** `digits` significant digits; plain between 1e-3 and 1e5, else with a power of ten. */
export function formatNumber(value: number, digits = 4): string {
  if (Number.isNaN(value)) return 'undefined';
  if (!Number.isFinite(value)) return value > 0 ? '∞' : `${MINUS}∞`;
  if (value === 0) return '0';
  const sign = value < 0 ? MINUS : '';
  const size = Math.abs(value);
  const [mantissa = '', exponentText = '0'] = size.toExponential(digits - 1).split('e');
  const exponent = Number(exponentText);
  if (exponent < -3 || exponent >= 5) return `${sign}${mantissa} × 10${superscript(exponent)}`;
  return sign + Number(`${mantissa}e${exponent}`).toFixed(Math.max(0, digits - 1 - exponent));
}

/** As many digits as an absolute uncertainty supports, at most eight significant ones. */
export function formatToTolerance(value: number, uncertainty: number): string {
  if (!Number.isFinite(value) || value === 0) return formatNumber(value);
  const spare = Math.floor(Math.log10(Math.abs(value) / Math.max(uncertainty, Number.MIN_VALUE)));
  return formatNumber(value, Math.min(8, Math.max(2, spare)));
}

/** Without trailing zeros, for ticks and fields. */
export function formatShort(value: number, digits = 6): string {
  const text = formatNumber(value, digits);
  if (!text.includes('.')) return text;
  return text.replace(/(\.\d*?)0+(?=$| )/, '$1').replace(/\.(?=$| )/, '');
}

/** A complex number, or a pair of conjugates when `pair`. */
export function formatComplex(re: number, im: number, pair = false, digits = 4): string {
  if (im === 0) return formatNumber(re, digits);
  // Dust of rounding beside the imaginary part is no digit that can be relied on.
  const real = Math.abs(re) < ROUNDING_DUST * Math.abs(im) ? 0 : re;
  const size = `${formatNumber(Math.abs(im), digits)}i`;
  const joint = pair ? '±' : im < 0 ? MINUS : '+';
  return `${formatNumber(real, digits)} ${joint} ${size}`;
}
