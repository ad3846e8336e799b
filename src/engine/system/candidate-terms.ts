import type { FlowSource } from './model-graph';

/** A term that a constant of motion may be made of, with its rate of change along the flow. */
export interface CandidateTerm {
  readonly formula: string;
  /** grad phi . f at state u. */
  rate(u: ArrayLike<number>, f: ArrayLike<number>): number;
}

/** States up to which products and logarithms of sums of pairs are tried. */
const PAIRS_UP_TO = 6;

/**
 * Terms over states and totals, simple ones first. A population of several classes enters by its total
 * and all classes but the first, which spans the same as its classes and reads better. Logarithms are
 * left out for states that may be negative.
 */
export function candidateTerms(source: FlowSource): readonly CandidateTerm[] {
  const { stateSymbols, nonnegative, populations } = source;
  const n = stateSymbols.length;
  const at = (values: ArrayLike<number>, i: number): number => values[i] ?? 0;
  const sumOf = (values: ArrayLike<number>, states: readonly number[]): number =>
    states.reduce((sum, i) => sum + at(values, i), 0);
  const linear: CandidateTerm[] = [];
  const logs: CandidateTerm[] = [];
  for (const { symbol, states } of populations) {
    const many = states.length > 1;
    if (many) {
      linear.push({ formula: symbol, rate: (_u, f) => sumOf(f, states) });
      if (states.every((i) => nonnegative[i])) {
        logs.push({ formula: `log(${symbol})`, rate: (u, f) => sumOf(f, states) / sumOf(u, states) });
      }
    }
    for (const i of many ? states.slice(1) : states) {
      linear.push({ formula: stateSymbols[i] ?? '', rate: (_u, f) => at(f, i) });
    }
    for (const i of states) {
      if (nonnegative[i])
        logs.push({ formula: `log(${stateSymbols[i] ?? ''})`, rate: (u, f) => at(f, i) / at(u, i) });
    }
  }
  const squares = stateSymbols.map((symbol, i): CandidateTerm => ({
    formula: `${symbol}^2`,
    rate: (u, f) => 2 * at(u, i) * at(f, i),
  }));
  return [...linear, ...logs, ...(n <= PAIRS_UP_TO ? [...squares, ...pairs(source)] : [])];
}

function pairs(source: FlowSource): readonly CandidateTerm[] {
  const { stateSymbols, nonnegative, populations } = source;
  const at = (values: ArrayLike<number>, i: number): number => values[i] ?? 0;
  const found: CandidateTerm[] = [];
  const sums: CandidateTerm[] = [];
  stateSymbols.forEach((first, i) =>
    stateSymbols.forEach((second, j) => {
      if (j <= i) return;
      found.push({
        formula: `${first}*${second}`,
        rate: (u, f) => at(u, i) * at(f, j) + at(u, j) * at(f, i),
      });
      const whole = populations.some(
        (one) => one.states.length === 2 && one.states.includes(i) && one.states.includes(j),
      );
      if (whole || nonnegative[i] !== true || nonnegative[j] !== true) return;
      sums.push({
        formula: `log(${first} + ${second})`,
        rate: (u, f) => (at(f, i) + at(f, j)) / (at(u, i) + at(u, j)),
      });
    }),
  );
  return [...found, ...sums];
}

/** A sum with coefficients as a formula; coefficients to twelve figures, which rounding cannot reach. */
export function writeSum(terms: readonly CandidateTerm[], coefficients: ArrayLike<number>): string {
  let text = '';
  terms.forEach((term, k) => {
    const coefficient = Number((coefficients[k] ?? 0).toPrecision(12));
    if (coefficient === 0 || !Number.isFinite(coefficient)) return;
    const size = Math.abs(coefficient);
    const factor = size === 1 ? '' : `${size}*`;
    const sign = coefficient < 0 ? (text === '' ? '-' : ' - ') : text === '' ? '' : ' + ';
    text += `${sign}${factor}${term.formula}`;
  });
  return text;
}
