import type { CompiledSystem } from '../system/contract';

/** Per-state tolerances and the system: what every one-step method is made with. */
export interface MethodSetting {
  readonly system: CompiledSystem;
  readonly relativeTolerance: number;
  readonly absoluteTolerance: number;
}

/**
 * A method that goes from t to t + h with an error estimate, and interpolates within the step. The
 * stepper drives it: begin, then attempt until the error is small enough, accept, attempt, ...
 */
export interface OneStepMethod {
  /** Order of the propagated solution. */
  readonly order: number;
  /** The error estimate goes as h to this power. */
  readonly errorExponent: number;
  readonly controlBeta: number;
  readonly smallestFactor: number;
  readonly largestFactor: number;
  /** Calls of the right-hand side so far. */
  evaluations: number;
  /** State at the current time; owned by the method and rewritten by `accept`. */
  readonly state: Float64Array;
  /** f at the current time; owned by the method. */
  readonly slope: Float64Array;

  /** Starts at (t, u); false where f is not finite there. */
  begin(t: number, u: Float64Array): boolean;
  /** Tries a step of h (either sign). Returns the error over tolerance, NaN where something was not finite. */
  attempt(t: number, h: number): number;
  /** Makes the last attempt the current state. */
  accept(): void;
  /** State at theta in [0, 1] of the last accepted step; valid until the next attempt. */
  interpolate(theta: number, out: Float64Array): void;
  /** Whether stability rather than accuracy limited the last accepted step. */
  looksStiff(): boolean;
}

/** Root mean square of v_i / (absolute + relative max(|y_i|, |z_i|)). */
export function scaledNorm(
  v: Float64Array,
  y: Float64Array,
  z: Float64Array,
  setting: MethodSetting,
  n: number,
): number {
  let sum = 0;
  for (let i = 0; i < n; i += 1) {
    const size = Math.max(Math.abs(y[i]), Math.abs(z[i]));
    const ratio = v[i] / (setting.absoluteTolerance + setting.relativeTolerance * size);
    sum += ratio * ratio;
  }
  return Math.sqrt(sum / n);
}
