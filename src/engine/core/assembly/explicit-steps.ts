import {
  attempt,
  CONTROL_BETA,
  DENSE_EVALUATIONS,
  DENSE_ROWS,
  ERROR_EXPONENT,
  EVALUATIONS_A_STEP,
  LARGEST_FACTOR,
  prepareDense,
  SLOPES,
  SMALLEST_FACTOR,
  STAGES,
  STIFFNESS_LIMIT,
  USES_END,
} from './method';
import { at, copy, put } from './memory';
import { exp, log, pow, rhs } from './model';

/**
 * Explicit Runge-Kutta runs with adaptive steps and output at given times: the loop of `integrators/stepper.ts`,
 * constant for constant. `./method` stands for one method: `build-core.mjs` writes it from a tableau in
 * `integrators/tableaus`, and compiles this file once for each. One call makes at most `maximumSteps` steps
 * and keeps all it needs in memory.
 */

/** Places in the control block. */
const TIME = 0;
const PREVIOUS = 1;
const STEP = 2;
const LAST_LOG_ERROR = 3;
const RELATIVE = 4;
const ABSOLUTE = 5;
const END = 6;
const STEPS = 7;
const REJECTED = 8;
const STIFF_STEPS = 9;
const EASY_STEPS = 10;
const EVALUATIONS = 11;
const FILLED = 12;
/** 1 where the last slope is still to become the first one, and where the dense output of the last step is ready. */
const ACCEPTED = 13;
const DENSE_READY = 14;
/** Signed length of the whole run. */
const SPAN = 15;

/** Outcomes. */
const SLICE_SPENT = 0;
const REACHED_END = 1;
const NOT_FINITE = 2;
const STEP_TOO_SMALL = 3;
const WINDOW_FILLED = 4;
const STIFF = 5;

const SAFETY: f64 = 0.9;
const SMALLEST_ERROR: f64 = 1e-14;
const LOG_FLOOR: f64 = -9.210340371976182;
const NOT_FINITE_FACTOR: f64 = 0.1;
const MOST_STIFF_STEPS: f64 = 15;
const MOST_EASY_STEPS: f64 = 6;
const TINIEST_STEP: f64 = 1e-290;

/**
 * @param work slope at the end (written), y, previous, proposal, stage (n each), slopes, dense rows
 * @param times output times that are wanted next, `count` of them, monotone; states go to `out`
 * @param heedStiffness whether to return where the system proves stiff
 */
export function advance(
  n: i32,
  control: usize,
  work: usize,
  maximumSteps: i32,
  times: usize,
  count: i32,
  out: usize,
  heedStiffness: i32,
): i32 {
  const bytes = (<usize>n) << 3;
  const y = work + bytes;
  const previous = y + bytes;
  const proposal = previous + bytes;
  const stage = proposal + bytes;
  const k = stage + bytes;
  const last = k + <usize>STAGES * bytes;
  const dense = k + <usize>SLOPES * bytes;

  const relative = at(control, RELATIVE);
  const absolute = at(control, ABSOLUTE);
  const end = at(control, END);
  const exponent: f64 = 1 / ERROR_EXPONENT - 0.75 * CONTROL_BETA;
  let time = at(control, TIME);
  let step = at(control, STEP);
  let lastLogError = at(control, LAST_LOG_ERROR);
  let filled = <i32>at(control, FILLED);
  let steps: f64 = 0;
  let rejected: f64 = 0;
  let evaluations: f64 = 0;
  let stiffSteps = at(control, STIFF_STEPS);
  let easySteps = at(control, EASY_STEPS);
  let outcome = SLICE_SPENT;
  let before = at(control, PREVIOUS);
  let accepted = at(control, ACCEPTED) !== 0;
  let ready = at(control, DENSE_READY) !== 0;
  const forward = at(control, SPAN) >= 0;

  while (<i32>(steps + rejected) < maximumSteps) {
    // Times that are reached, within the last step or at its end.
    while (filled < count) {
      const wanted = at(times, filled);
      if (forward ? wanted > time : wanted < time) break;
      const target = out + <usize>filled * bytes;
      if (wanted === time) copy(target, y, n);
      else {
        if (!ready) {
          prepareDense(before, time - before, n, previous, y, k, proposal, dense);
          evaluations += DENSE_EVALUATIONS;
          ready = true;
        }
        interpolate(n, (wanted - before) / (time - before), previous, dense, target);
      }
      filled += 1;
    }
    if (filled === count) {
      outcome = WINDOW_FILLED;
      break;
    }
    if (time === end) {
      outcome = REACHED_END;
      break;
    }
    if (accepted) {
      copy(k, last, n);
      accepted = false;
    }
    let rejectedHere = false;
    let stepped = false;
    while (!stepped) {
      const left = end - time;
      const clipped = Math.abs(step) * 1.01 >= Math.abs(left);
      const h = clipped ? left : step;
      const error = attempt(time, h, n, y, k, stage, proposal, relative, absolute);
      evaluations += EVALUATIONS_A_STEP;
      if (error <= 1) {
        if (!USES_END) {
          rhs(time + h, proposal, last);
          evaluations += 1;
        }
        copy(previous, y, n);
        copy(y, proposal, n);
        before = time;
        time = clipped ? end : time + h;
        steps += 1;
        stepped = true;
        if (looksStiff(n, h, y, stage, k + <usize>(STAGES - 1) * bytes, last)) {
          stiffSteps += 1;
          easySteps = 0;
        } else if (stiffSteps > 0) {
          easySteps += 1;
          if (easySteps >= MOST_EASY_STEPS) stiffSteps = 0;
        }
        const logError = log(Math.max(error, SMALLEST_ERROR));
        let factor = SAFETY * exp(CONTROL_BETA * lastLogError - exponent * logError);
        factor = Math.min(LARGEST_FACTOR, Math.max(SMALLEST_FACTOR, factor));
        lastLogError = Math.max(logError, LOG_FLOOR);
        const next = h * (rejectedHere ? Math.min(factor, 1) : factor);
        step = clipped && Math.abs(next) < Math.abs(step) && error < 0.5 ? step : next;
        ready = false;
        accepted = true;
      } else {
        const bad = !isFinite(error);
        rejected += 1;
        rejectedHere = true;
        step = h * (bad ? NOT_FINITE_FACTOR : Math.max(SAFETY * pow(error, -exponent), SMALLEST_FACTOR));
        if (Math.abs(step) <= 4 * f64.EPSILON * Math.abs(time) || Math.abs(step) < TINIEST_STEP) {
          outcome = bad ? NOT_FINITE : STEP_TOO_SMALL;
          break;
        }
        if (<i32>(steps + rejected) >= maximumSteps) break;
      }
    }
    if (outcome !== SLICE_SPENT) break;
    if (heedStiffness !== 0 && stiffSteps >= MOST_STIFF_STEPS) {
      outcome = STIFF;
      break;
    }
  }
  copy(work, accepted ? last : k, n);
  put(control, TIME, time);
  put(control, PREVIOUS, before);
  put(control, ACCEPTED, accepted ? 1 : 0);
  put(control, DENSE_READY, ready ? 1 : 0);
  put(control, STEP, step);
  put(control, LAST_LOG_ERROR, lastLogError);
  put(control, STEPS, at(control, STEPS) + steps);
  put(control, REJECTED, at(control, REJECTED) + rejected);
  put(control, STIFF_STEPS, stiffSteps);
  put(control, EASY_STEPS, easySteps);
  put(control, EVALUATIONS, at(control, EVALUATIONS) + evaluations);
  put(control, FILLED, <f64>filled);
  return outcome;
}

/** |h lambda| by the last two slopes at the end of the step, both at t + h (Hairer & Wanner II, sect. IV.2). */
function looksStiff(n: i32, h: f64, y: usize, stage: usize, before: usize, last: usize): boolean {
  let slopes: f64 = 0;
  let distance: f64 = 0;
  for (let i = 0; i < n; i += 1) {
    const a = at(last, i) - at(before, i);
    const b = at(y, i) - at(stage, i);
    slopes += a * a;
    distance += b * b;
  }
  return distance > 0 && Math.abs(h) * Math.sqrt(slopes / distance) > STIFFNESS_LIMIT;
}

function interpolate(n: i32, theta: f64, previous: usize, dense: usize, out: usize): void {
  const rest = 1 - theta;
  for (let i = 0; i < n; i += 1) {
    let sum: f64 = 0;
    for (let m = DENSE_ROWS - 1; m >= 0; m -= 1)
      sum = (sum + at(dense, m * n + i)) * (m % 2 === 0 ? theta : rest);
    put(out, i, at(previous, i) + sum);
  }
}
