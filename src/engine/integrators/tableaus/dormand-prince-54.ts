import type { ExplicitTableau } from '../explicit-tableau';

/**
 * Explicit Runge-Kutta pair of orders 5 and 4 whose last stage is the first of the next step, with
 * dense output of order 4.
 * Source: Dormand & Prince, J. Comp. Appl. Math. 6 (1980) 19; dense output: Hairer, Norsett & Wanner,
 * Solving Ordinary Differential Equations I (2nd ed. 1993), section II.6 (from memory).
 */
export const DORMAND_PRINCE_54: ExplicitTableau = {
  order: 5,
  errorExponent: 5,
  controlBeta: 0.04,
  smallestFactor: 0.2,
  largestFactor: 10,
  stiffnessLimit: 3.25,
  c: [0, 1 / 5, 3 / 10, 4 / 5, 8 / 9, 1],
  a: [
    [],
    [1 / 5],
    [3 / 40, 9 / 40],
    [44 / 45, -56 / 15, 32 / 9],
    [19372 / 6561, -25360 / 2187, 64448 / 6561, -212 / 729],
    [9017 / 3168, -355 / 33, 46732 / 5247, 49 / 176, -5103 / 18656],
  ],
  b: [35 / 384, 0, 500 / 1113, 125 / 192, -2187 / 6784, 11 / 84],
  error: [71 / 57600, 0, -71 / 16695, 71 / 1920, -17253 / 339200, 22 / 525, -1 / 40],
  lowOrderError: null,
  denseC: [],
  denseA: [],
  dense: [
    [
      -12715105075 / 11282082432,
      0,
      87487479700 / 32700410799,
      -10690763975 / 1880347072,
      701980252875 / 199316789632,
      -1453857185 / 822651844,
      69997945 / 29380423,
    ],
  ],
};
