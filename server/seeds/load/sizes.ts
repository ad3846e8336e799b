/** How much is written. */
export interface LoadSizes {
  readonly labs: number;
  readonly people: number;
  readonly presets: number;
  readonly versions: number;
  readonly handIns: number;
}

export const FULL_LOAD: LoadSizes = {
  labs: 200,
  people: 2000,
  presets: 20_000,
  versions: 5,
  handIns: 10_000,
};

/** All times of what is written lie before this day, so that the same seed gives the same data. */
export const LOAD_DAY = Date.UTC(2026, 0, 1);
export const A_DAY = 24 * 60 * 60_000;

/** Rows of one statement: as many as keep it well below SQLite's limits. */
const AT_ONCE = 400;

export function inSlices<Row>(rows: readonly Row[]): Row[][] {
  const slices: Row[][] = [];
  for (let from = 0; from < rows.length; from += AT_ONCE) slices.push(rows.slice(from, from + AT_ONCE));
  return slices;
}
