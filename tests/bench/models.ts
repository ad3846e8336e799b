import { systemFromEquations } from '../../src/engine/system/from-equations';
import type { CompiledSystem } from '../../src/engine/system/contract';

/** The systems of the bench; `yardsticks/` holds the same formulas in C and Python. */
export interface BenchModel {
  readonly classes: 3 | 8;
  readonly equations: readonly string[];
  readonly parameters: Readonly<Record<string, number>>;
  readonly start: readonly number[];
}

/** Prey with self-regulation and a saturating predator of two sexes; cycles at K = 4. */
export const THREE_CLASSES: BenchModel = {
  classes: 3,
  equations: [
    "x' = r*x*(1-x/K) - x*(a1*y1+a2*y2)/(1+h*x)",
    "y1' = e*x*(a1*y1+a2*y2)/(1+h*x)/2 - m1*y1",
    "y2' = e*x*(a1*y1+a2*y2)/(1+h*x)/2 - m2*y2",
  ],
  parameters: { r: 1, K: 4, a1: 1.1, a2: 0.9, h: 0.6, e: 0.8, m1: 0.35, m2: 0.25 },
  start: [0.5, 0.25, 0.25],
};

const SHARES = [0.1, 0.2, 0.3, 0.4] as const;

/** Attack rate of predator class j on prey class i. */
const attack = (i: number, j: number): string => `${0.7 + 0.05 * i + 0.08 * j}`;

function eightClasses(): BenchModel {
  const classes = [0, 1, 2, 3];
  const prey = classes.map((i) => `x${i}`).join('+');
  const denominator = (j: number): string =>
    `(1+h*(${classes.map((i) => `${attack(i, j)}*x${i}`).join('+')}))`;
  const eaten = classes.map(
    (j) => `(${classes.map((i) => `${attack(i, j)}*x${i}`).join('+')})*y${j}/${denominator(j)}`,
  );
  return {
    classes: 8,
    equations: [
      ...classes.map(
        (i) =>
          `x${i}' = ${SHARES[i]}*r*(${prey})*(1-(${prey})/K) - x${i}*(${classes
            .map((j) => `${attack(i, j)}*y${j}/${denominator(j)}`)
            .join('+')})`,
      ),
      ...classes.map((j) => `y${j}' = e*(${eaten.join('+')})/4 - ${0.25 + 0.05 * j}*y${j}`),
    ],
    parameters: { r: 1, K: 4, h: 0.6, e: 0.8 },
    start: [0.1, 0.1, 0.15, 0.15, 0.1, 0.1, 0.15, 0.15],
  };
}

export const EIGHT_CLASSES: BenchModel = eightClasses();

export function compileBenchModel(model: BenchModel, backend: 'wasm' | 'closure' = 'wasm'): CompiledSystem {
  const made = systemFromEquations({
    equations: model.equations,
    parameters: model.parameters,
    nonnegative: true,
    backend,
  });
  if (!made.ok) throw new Error(made.message);
  return made.system;
}
