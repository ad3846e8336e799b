import cases from './cases.json';

/** One entry of the catalogue; what is expected differs from case to case and is read where it is checked. */
export interface ProblemCase {
  readonly id: string;
  readonly title: string;
  readonly equations: readonly string[];
  readonly source: string;
}

/** The case of a name, with its own shape of parameters and answers. */
export function problem<Id extends (typeof cases)[number]['id']>(id: Id): ProblemCase {
  const found = cases.find((one) => one.id === id);
  if (found === undefined) throw new Error(`no case ${id}`);
  return found;
}

/** Title of a test: the case, what it is about and where the answer comes from. */
export function titleOf(id: string): string {
  const { title, source } = problem(id);
  return `${id} ${title} [${source}]`;
}

/** Numbers agree within an absolute tolerance. */
export function within(actual: number | undefined, expected: number, tolerance: number): void {
  if (actual === undefined || !(Math.abs(actual - expected) <= tolerance))
    throw new Error(`${actual} differs from ${expected} by more than ${tolerance}`);
}
