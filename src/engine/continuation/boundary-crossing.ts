import type { BranchPoint, Monitor } from './test-functions';

const ITERATIONS = 30;
/** First distance of the secant, and the change of the parameter at which it ends, in units of the range. */
const FIRST = 1e-5;
const TOLERANCE = 1e-14;
/** A root further off than this belongs to another crossing. */
const FAR = 0.02;

/**
 * The value of the parameter at which an absent population's block of the Jacobian is singular, by secants along
 * the branch without it. There the corrector is regular, unlike on the branch that ends at the crossing.
 *
 * @param monitor of the face without the population
 * @param state state near the crossing, absent states zero
 * @param group index of the population among `monitor.absent`
 */
export function refineBoundaryCrossing(
  monitor: Monitor,
  state: Float64Array,
  parameter: number,
  group: number,
): BranchPoint | null {
  const { curve } = monitor;
  const across = new Float64Array(curve.m + 1);
  across[curve.m] = 1;
  let w = curve.pointOf(state, parameter);
  const at = (scaled: number): BranchPoint | null => {
    const trial = w.slice();
    trial[curve.m] = scaled;
    if (curve.correct(trial, across, scaled) < 0) return null;
    w = trial;
    return monitor.pointAt(trial, across);
  };
  const first = parameter / curve.parameterScale;
  const near = (point: BranchPoint): BranchPoint | null =>
    curve.active.every((i) => Math.abs(point.u[i] - state[i]) < FAR * curve.stateScale[i]) ? point : null;
  let a = first;
  let b = first + FIRST;
  let before = at(a);
  let point = at(b);
  for (let k = 0; k < ITERATIONS && before && point; k += 1) {
    const ga: number = before.monitors.transversal[group];
    const gb: number = point.monitors.transversal[group];
    if (gb === 0 || Math.abs(b - a) < TOLERANCE || ga === gb) return near(point);
    const next: number = b - (gb * (b - a)) / (gb - ga);
    if (!(Math.abs(next - first) < FAR)) return null;
    a = b;
    before = point;
    b = next;
    point = at(b);
  }
  return point && near(point);
}
