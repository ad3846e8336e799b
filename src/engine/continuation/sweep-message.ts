import type { Branch } from './contract';

export const NEEDS_PERIOD_MAP =
  'The formulas contain the time t, so that nothing rests and no equilibrium can be followed; the fixed points of the period map can, as cycles.';
export const NO_SUCH_PARAMETER = 'The parameter to sweep is not one of this model.';
export const NO_RANGE = 'The range of a sweep needs two different finite ends.';
export const STOPPED = 'Stopped before the end; what was found is shown.';
export const NOT_ISOLATED =
  'Some states that rest lie on a whole curve of such states at one value of the parameter; those cannot be followed.';
export const NOT_DIFFERENTIABLE =
  'Some states that rest have no Jacobian, as where the last pair would have to meet; they are not drawn.';
export const NOT_FOLLOWED =
  'From some states no branch could be followed, because the equations are singular there; other branches may meet at them.';
const NEUTRAL_STRETCH =
  'Along a stretch a real part cannot be told from zero, so that the equilibrium is neutral or nearly so there; no Hopf point is claimed on it.';
const BUDGET_SPENT = 'The point budget was spent, so that branches may be missing.';

/** So many neighbouring points without decision are a stretch. */
const STRETCH = 3;

/** What a finished sweep says: how much was followed, and what was left open. */
export function summarise(
  branches: readonly Branch[],
  points: number,
  budgetSpent: boolean,
  notes: readonly string[],
): string {
  const count = branches.length === 1 ? '1 branch' : `${branches.length} branches`;
  const told =
    branches.length === 0 ? 'No equilibrium was followed along the range.' : `${count}, ${points} points.`;
  const more = budgetSpent ? [BUDGET_SPENT] : [];
  if (branches.some(hasNeutralStretch)) more.push(NEUTRAL_STRETCH);
  return [told, ...more, ...notes].join(' ');
}

function hasNeutralStretch(branch: Branch): boolean {
  let run = 0;
  return branch.attracts.some((value, k) => {
    run = value === 2 && branch.feasible[k] === 1 ? run + 1 : 0;
    return run >= STRETCH;
  });
}
