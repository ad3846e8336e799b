/**
 * Coefficients of an explicit Runge-Kutta pair with dense output. Stages 0..s-1 make the solution
 *
 *     k_i = f(t + c_i h, y + h sum_j a_ij k_j),   y1 = y + h sum_i b_i k_i,
 *
 * stage s is f(t + h, y1), which is the first stage of the next step; further stages serve the dense
 * output alone. Rows may be shorter than the number of stages before them: what is absent is zero.
 */
export interface ExplicitTableau {
  /** Order of the propagated solution. */
  readonly order: number;
  /** The error estimate goes as h to this power. */
  readonly errorExponent: number;
  /** Stabilisation of the step control; 0 for plain control. */
  readonly controlBeta: number;
  /** Bounds on the change of the step size from one step to the next. */
  readonly smallestFactor: number;
  readonly largestFactor: number;
  /** Estimates of |h lambda| beyond this, step after step, mean that stability limits the step. */
  readonly stiffnessLimit: number;
  readonly c: readonly number[];
  readonly a: readonly (readonly number[])[];
  readonly b: readonly number[];
  /** Weights of the error estimate; length s + 1 where it uses the last stage, too. */
  readonly error: readonly number[];
  /** Weights of a second estimate of lower order that corrects the first; null for none. */
  readonly lowOrderError: readonly number[] | null;
  readonly denseC: readonly number[];
  readonly denseA: readonly (readonly number[])[];
  /**
   * Rows d of the dense output with x = theta, D_k = h sum_i d_ki k_i:
   * y + x (F0 + (1-x) (F1 + x (F2 + (1-x) (D_0 + x (D_1 + ...))))), F0 = y1 - y, F1 = h f(y) - F0,
   * F2 = 2 F0 - h (f(y) + f(y1)).
   */
  readonly dense: readonly (readonly number[])[];
}
