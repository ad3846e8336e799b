/** A number for a sentence: three significant digits, powers of ten where it is very small or large. */
export function inWords(value: number): string {
  if (value === 0) return '0';
  const size = Math.abs(value);
  if (size < 1e-3 || size >= 1e6) return value.toExponential(1);
  return String(Number(value.toPrecision(3)));
}

/** A per-time rate with its unit, `0.0204 per week`. */
export function ratePer(value: number, timeUnit: string): string {
  return `${inWords(value)} per ${timeUnit}`;
}

/** `a`, `a and b`, `a, b and c`. */
export function listed(items: readonly string[]): string {
  if (items.length < 2) return items.join('');
  return `${items.slice(0, -1).join(', ')} and ${items[items.length - 1]}`;
}
