import { inWords, listed } from '../verdict/wording';

/** Lowest and highest of some values. */
export function extentOf(values: Float64Array): readonly [number, number] {
  return [values.reduce((a, b) => Math.min(a, b)), values.reduce((a, b) => Math.max(a, b))];
}

/** A branch of equilibria or cycles, as far as its stability goes. */
export interface Followed {
  readonly parameters: Float64Array;
  /** 1 attracts, 0 repels, 2 undecided, at each point. */
  readonly attracts: Uint8Array;
  readonly feasible: Uint8Array;
}

/** A special point between the points `index` and `index + 1` of a branch. */
export interface Between {
  readonly branch: number;
  readonly index: number;
  readonly parameter: number;
}

type Stretch = readonly [number, number];

/**
 * Where along the parameter a branch attracts, in a sentence. Stretches of feasible points are extended to
 * the special points at which they end, on this branch or on one that crosses it there.
 *
 * @param own index of this branch among those that the special points are on
 */
export function whereItAttracts(branch: Followed, own: number, special: readonly Between[]): string {
  const at = (k: number): readonly number[] => endsBetween(branch, k, own, special);
  const attracts = stretches(branch, at, 1);
  const repels = stretches(branch, at, 0);
  // A lone undecided point is the special point itself.
  const undecided = stretches(branch, at, 2).filter(([a, b]) => a !== b);
  if (repels.length === 0 && undecided.length === 0) return 'Attracts throughout.';
  if (repels.length === 0 && attracts.length === 0) return 'Undecided at this accuracy throughout.';
  if (attracts.length === 0 && undecided.length === 0) return 'Repels throughout.';
  const told = [
    attracts.length > 0 ? `Attracts ${inOrder(attracts)}` : 'Attracts nowhere',
    ...(undecided.length > 0 ? [`undecided at this accuracy ${inOrder(undecided)}`] : []),
  ];
  return `${told.join('; ')}.`;
}

function inOrder(found: readonly Stretch[]): string {
  const sorted = [...found].sort((a, b) => a[0] - b[0]);
  return listed(
    sorted.map(([a, b]) =>
      inWords(a) === inWords(b) ? `at ${inWords(a)}` : `from ${inWords(a)} to ${inWords(b)}`,
    ),
  );
}

/** Runs of feasible neighbours of one kind, each as its extent along the parameter. */
function stretches(
  { parameters, attracts, feasible }: Followed,
  at: (k: number) => readonly number[],
  kind: number,
): Stretch[] {
  const found: Stretch[] = [];
  const counts = (k: number): boolean => k < attracts.length && feasible[k] === 1 && attracts[k] === kind;
  let begun = -1;
  for (let k = 0; k <= attracts.length; k += 1) {
    if (counts(k) && begun < 0) begun = k;
    if (counts(k) || begun < 0) continue;
    const beyond = kind === 2 ? [] : [...at(begun - 1), ...at(k - 1)];
    found.push(extentOf(Float64Array.from([...beyond, ...parameters.subarray(begun, k)])));
    begun = -1;
  }
  return found;
}

/** Parameters at which a stretch may end between the points k and k + 1: special points, or a lone undecided point. */
function endsBetween(
  { parameters, attracts }: Followed,
  k: number,
  own: number,
  special: readonly Between[],
): readonly number[] {
  if (k < 0 || k + 1 >= parameters.length) return [];
  const here = special.filter((one) => one.branch === own && one.index === k);
  if (here.length > 0) return here.map((one) => one.parameter);
  const lone = [k, k + 1].filter((j) => attracts[j] === 2 && attracts[j - 1] !== 2 && attracts[j + 1] !== 2);
  if (lone.length > 0) return lone.map((j) => parameters[j]);
  const [low, high] = extentOf(parameters.subarray(k, k + 2));
  return special.map((one) => one.parameter).filter((value) => value >= low && value <= high);
}
