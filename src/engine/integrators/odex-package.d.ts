/** Types of what odex 2.0.4 exports and we use. */
export type Derivative = (t: number, y: number[]) => number[];

/** Called with the start (step 1) and after each step; false ends the run. `dense` reaches from tOld to t. */
export type OutputFunction = (
  step: number,
  tOld: number,
  t: number,
  y: number[],
  dense?: (component: number, t: number) => number,
) => boolean | void;

export declare class Solver {
  constructor(n: number);
  /** Steps after which it gives up; 10,000 unless set. */
  maxSteps: number;
  /** Never taken below 1e-4. */
  initialStepSize: number;
  /** Needs an output function. */
  denseOutput: boolean;
  absoluteTolerance: number | number[];
  relativeTolerance: number | number[];
  solve(f: Derivative, t0: number, y0: number[], tEnd: number, onStep?: OutputFunction): SolverResult;
}

export interface SolverResult {
  readonly y: number[];
  /** 0 reached the end, 1 steps spent, 2 ended by the output function. */
  readonly outcome: 0 | 1 | 2;
  readonly xEnd: number;
  readonly nStep: number;
  readonly nAccept: number;
  readonly nReject: number;
  readonly nEval: number;
}
