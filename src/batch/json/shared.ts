/** What JSON can hold; numbers are written in full precision, those that are not finite as null. */
export type Json =
  string | number | boolean | null | readonly Json[] | { readonly [key: string]: Json | undefined } | object;

export interface JsonRecord {
  readonly [key: string]: Json;
}

/** One number for each name. */
export function byName(names: readonly string[], values: ArrayLike<number>): Record<string, number> {
  return Object.fromEntries(names.map((name, i) => [name, values[i]]));
}

/**
 * A series for each name from interleaved values, values[k*m + i] for name i of m.
 *
 * @param skip entries left out at the beginning
 */
export function seriesByName(
  names: readonly string[],
  values: ArrayLike<number>,
  count: number,
  skip = 0,
): Record<string, number[]> {
  return Object.fromEntries(names.map((name, i) => [name, column(values, names.length, i, skip, count)]));
}

/** Rows of a matrix stored row by row. */
export function rows(values: ArrayLike<number>, width: number): number[][] {
  const count = width > 0 ? Math.floor(values.length / width) : 0;
  return Array.from({ length: count }, (_, k) =>
    Array.from({ length: width }, (_unused, i) => values[k * width + i]),
  );
}

const ATTRACTS = ['no', 'yes', 'undecided'] as const;

/** Whether each point attracts, in words. */
export function attractsInWords(codes: ArrayLike<number>): string[] {
  return Array.from(codes, (code) => ATTRACTS[code] ?? 'undecided');
}

export function flags(codes: ArrayLike<number>): boolean[] {
  return Array.from(codes, (code) => code === 1);
}

function column(values: ArrayLike<number>, width: number, i: number, skip: number, count: number): number[] {
  return Array.from({ length: Math.max(0, count - skip) }, (_, k) => values[(k + skip) * width + i]);
}
