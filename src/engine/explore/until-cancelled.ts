import type { Progress } from '../continuation/contract';

/** What every long computation answers with, whatever else. */
export interface Outcome {
  readonly status: string;
  readonly message: string;
}

const CANCELLED = 'Cancelled; what was found until then stays.';

/** The stretch of the whole progress that one computation fills. */
export interface Stretch {
  readonly from: number;
  readonly share: number;
}

/**
 * Drives one computation as a part of a larger one: its progress is moved to its stretch, its partial
 * results are put into the larger result, and when cancelled it ends with what it found so far.
 *
 * @param isCancelled asked between slices, once there is a partial result to end with
 */
export function* untilCancelled<Result extends Outcome, Whole>(
  run: Generator<Progress<Result>, Result>,
  { from, share }: Stretch,
  combine: (partial: Result) => Whole,
  isCancelled?: () => boolean,
): Generator<Progress<Whole>, Result> {
  let found: Result | null = null;
  for (;;) {
    const next = run.next();
    if (next.done) return next.value;
    const { fraction, stage, partial } = next.value;
    found = partial ?? found;
    if (found && isCancelled?.()) {
      run.return(found);
      return Object.assign({}, found, { status: 'cancelled', message: CANCELLED } as const);
    }
    yield { fraction: from + share * fraction, stage, partial: partial && combine(partial) };
  }
}
