import { runStudy } from '@/batch/run-study';

export interface PointResult {
  readonly kind: string;
  readonly parameter: number;
  readonly state: Record<string, number>;
  readonly feasible: boolean;
  readonly hopf: { omega: number; l1: number; criticality: string; crossingSpeed: number } | null;
}
export interface EquilibriumResult {
  readonly state: Record<string, number>;
  readonly eigenvalues: readonly { re: number; im: number }[];
  readonly type: string;
  readonly attracts: string;
  readonly margin: number | null;
  readonly absent: readonly string[];
  readonly invasions: readonly {
    population: string;
    answer: string;
    growthRate: number | null;
    method: string;
  }[];
}
export interface BranchResult {
  readonly absent: readonly string[];
  readonly parameters: readonly number[];
  readonly states: Record<string, number[]>;
}
export interface SideResult {
  readonly status: string;
  readonly message: string;
  readonly times: readonly number[];
  readonly states: Record<string, number[]>;
  readonly equilibria: readonly EquilibriumResult[];
  readonly specialPoints: readonly PointResult[];
  readonly branches: readonly BranchResult[];
  readonly bands: readonly {
    parameters: number[];
    lowest: Record<string, number[]>;
    highest: Record<string, number[]>;
  }[];
}
export interface TaskResult {
  readonly split: SideResult;
  readonly twin: SideResult | null;
  readonly verdict: { answer: string; sentence: string } | null;
  readonly shifts: readonly {
    kind: string;
    pooled: number | null;
    split: number | null;
    moved: number | null;
  }[];
}

/** Results of a study as another program reads them, after a round trip through JSON text. */
export function studyResults<Result = TaskResult>(study: unknown): readonly Result[] {
  const outcome = runStudy(JSON.parse(JSON.stringify(study)));
  if (!outcome.ok) throw new Error(outcome.problems.join('; '));
  return (JSON.parse(JSON.stringify(outcome.results)) as { tasks: Result[] }).tasks;
}

/** What the only task of a study found. */
export function onlyResult<Result = TaskResult>(study: unknown): Result {
  const [first] = studyResults<Result>(study);
  if (first === undefined) throw new Error('the study has no task');
  return first;
}

/** The state of an equilibrium or point as a list, in the order of its symbols. */
export const listOf = (state: Record<string, number>): number[] => Object.values(state);

/** The found equilibrium nearest to a state. */
export function nearestResult(side: SideResult, state: readonly number[]): EquilibriumResult {
  const gap = (one: EquilibriumResult): number =>
    Math.max(...listOf(one.state).map((x, i) => Math.abs(x - state[i])));
  const [first] = [...side.equilibria].sort((a, b) => gap(a) - gap(b));
  if (first === undefined) throw new Error(side.message);
  return first;
}
