import type { IntegrationStatus } from './contract';
import { chooseInitialStep } from './initial-step';
import type { MethodSetting, OneStepMethod } from './one-step-method';

/** Aim a little below the tolerance, so that few steps are rejected. */
const SAFETY = 0.9;
/** Errors this far below the tolerance tell no more. */
const SMALLEST_ERROR = 1e-14;
const LOG_FLOOR = Math.log(1e-4);
/** Cut after an attempt that left the finite numbers. */
const NOT_FINITE_FACTOR = 0.1;
/** So many stiff-looking steps without six easy ones between them count as stiffness. */
const STIFF_STEPS = 15;
const EASY_STEPS = 6;
/** Below this the step is lost in rounding of t even at t = 0. */
const TINIEST_STEP = 1e-290;

/** Outcome of one call of `advance`. */
export type StepOutcome = 'stepped' | Extract<IntegrationStatus, 'not-finite' | 'step-too-small'>;

/**
 * Drives a one-step method with adaptive steps by proportional-integral control (Hairer & Wanner II,
 * sect. IV.2), and tells when the system looks stiff. After each `advance` the step lies between
 * `previousTime` and `time`, and `interpolate` serves any time within.
 */
export class Stepper {
  time = 0;
  previousTime = 0;
  steps = 0;
  rejected = 0;
  private h = 0;
  private lastLogError = LOG_FLOOR;
  private stiffSteps = 0;
  private easySteps = 0;
  private finite = true;

  constructor(
    readonly method: OneStepMethod,
    private readonly setting: MethodSetting,
  ) {}

  get state(): Float64Array {
    return this.method.state;
  }

  /** f at `time`. */
  get slope(): Float64Array {
    return this.method.slope;
  }

  get stiff(): boolean {
    return this.stiffSteps >= STIFF_STEPS;
  }

  /** @param span signed length of the run, which bounds the first step. */
  begin(t: number, u: Float64Array, span: number, initialStep?: number): void {
    const { method } = this;
    this.time = t;
    this.previousTime = t;
    this.lastLogError = LOG_FLOOR;
    this.stiffSteps = 0;
    this.finite = method.begin(t, u);
    if (!this.finite || span === 0) return;
    this.h = initialStep
      ? Math.sign(span) * Math.min(Math.abs(initialStep), Math.abs(span))
      : chooseInitialStep(this.setting, t, method.state, method.slope, span, method.order);
  }

  /** Makes one accepted step towards `end`, ending there exactly where it would go past. */
  advance(end: number): StepOutcome {
    if (!this.finite) return 'not-finite';
    const { method } = this;
    const exponent = 1 / method.errorExponent - 0.75 * method.controlBeta;
    let rejectedHere = false;
    for (;;) {
      const left = end - this.time;
      const clipped = Math.abs(this.h) * 1.01 >= Math.abs(left);
      const h = clipped ? left : this.h;
      const error = method.attempt(this.time, h);
      const bad = !Number.isFinite(error);
      if (error <= 1) {
        method.accept();
        this.previousTime = this.time;
        this.time = clipped ? end : this.time + h;
        this.steps += 1;
        this.noteStiffness();
        // SAFETY error^-exponent lastError^beta; the logarithm of the error serves the next step, too.
        const logError = Math.log(Math.max(error, SMALLEST_ERROR));
        const factor = this.bound(
          SAFETY * Math.exp(method.controlBeta * this.lastLogError - exponent * logError),
        );
        this.lastLogError = Math.max(logError, LOG_FLOOR);
        const next = h * (rejectedHere ? Math.min(factor, 1) : factor);
        // A step cut short by the end says little against the step before it.
        this.h = clipped && Math.abs(next) < Math.abs(this.h) && error < 0.5 ? this.h : next;
        return 'stepped';
      }
      this.rejected += 1;
      rejectedHere = true;
      this.h = h * (bad ? NOT_FINITE_FACTOR : Math.max(SAFETY * error ** -exponent, method.smallestFactor));
      if (Math.abs(this.h) <= 4 * Number.EPSILON * Math.abs(this.time) || Math.abs(this.h) < TINIEST_STEP)
        return bad ? 'not-finite' : 'step-too-small';
    }
  }

  /** State at a time within the last step. */
  interpolate(t: number, out: Float64Array): void {
    if (t === this.time) out.set(this.method.state);
    else this.method.interpolate((t - this.previousTime) / (this.time - this.previousTime), out);
  }

  private bound(factor: number): number {
    return Math.min(this.method.largestFactor, Math.max(this.method.smallestFactor, factor));
  }

  private noteStiffness(): void {
    if (this.method.looksStiff()) {
      this.stiffSteps += 1;
      this.easySteps = 0;
    } else if (this.stiffSteps > 0) {
      this.easySteps += 1;
      if (this.easySteps >= EASY_STEPS) this.stiffSteps = 0;
    }
  }
}
