/** Types of the parts of odex that we use; the package's own .ts fails strict checks. */
export declare class Solver {
  constructor(f: (t: number, y: number[]) => number[], n: number, options?: Partial<SolverOptions>);
  solve(
    t0: number,
    y0: number[],
    tEnd: number,
    onSolution?: (t: number, y: number[]) => void | false,
  ): SolverResult;
  grid(dt: number, out: (t: number, y: number[]) => void | false): unknown;
}
export interface SolverOptions {
  absoluteTolerance: number | number[];
  relativeTolerance: number | number[];
  maxSteps: number;
  initialStepSize: number;
  denseOutput: boolean;
}
export interface SolverResult {
  y: number[];
  outcome: number;
  nStep: number;
  nAccept: number;
  nReject: number;
  nEval: number;
}
