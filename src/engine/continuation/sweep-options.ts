export interface SweepOptions {
  readonly parameterIndex: number;
  readonly from: number;
  readonly to: number;
  /** States to begin from, beside what the searches find; also set the size of the guessed box. */
  readonly starts: readonly Float64Array[];
  readonly box?: readonly ({ readonly from: number; readonly to: number } | null)[];
  /** Long-run bands past Hopf points; true unless told. */
  readonly bands?: boolean;
  /** Largest step in scaled arclength: smaller draws smoother and takes longer. */
  readonly largestStep?: number;
  /** What the parameter is called in sentences. */
  readonly parameterLabel?: string;
  /** Clock for the time told in the result, in milliseconds; without one it is 0. */
  readonly clock?: () => number;
}
