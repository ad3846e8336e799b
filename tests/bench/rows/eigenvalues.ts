import { nativeEigenvalues } from '../../../src/engine/core/native-eigenvalues';
import { eigenvalues } from '../../../src/engine/linalg/eigenvalues';
import { balanceMatrix } from '../../../src/engine/linalg/balance';
import { reduceToHessenberg } from '../../../src/engine/linalg/hessenberg';
import { hessenbergEigenvalues } from '../../../src/engine/linalg/shifted-qr';
import { absent, atMost, median, milliseconds, time, times, told, type Row } from '../measure';
import { runPythonEigenvalues } from '../yardsticks/run';

const ROUNDS = 3;
const REPEATS_OF_SMALL = 200;

/** Eigenvalues of large matrices against NumPy, and of small ones in plain code against the core. */
export function eigenvalueRows(): Row[] {
  return [...[250, 500].flatMap(largeRows), ...[3, 6, 12, 30].map(smallRow)];
}

function largeRows(n: number): Row[] {
  const a = matrix(n);
  const ratios: number[] = [];
  const own: number[] = [];
  let apart = 0;
  for (let round = 0; round < ROUNDS; round += 1) {
    own.push(time(() => void eigenvalues(a, n), 1, 400).fastest);
    const theirs = runPythonEigenvalues(n);
    if (!theirs) continue;
    ratios.push((own.at(-1) ?? NaN) / theirs.milliseconds);
    apart = Math.abs((eigenvalues(a, n).re[0] ?? NaN) - theirs.leading);
  }
  const name = `eigenvalues, n = ${n}`;
  const row = `${name}: time over NumPy on one thread`;
  if (ratios.length === 0)
    return [
      absent(row, 'no python3 with NumPy on this machine', 'at most 2 x'),
      told(name, milliseconds(median(own))),
    ];
  return [
    atMost(row, median(ratios), 2, times),
    told(
      `${name}: time, and leading real part against NumPy's`,
      `${milliseconds(median(own))}, ${apart.toExponential(1)} apart`,
    ),
  ];
}

function smallRow(n: number): Row {
  const a = matrix(n);
  const [re, im] = [new Float64Array(n), new Float64Array(n)];
  const [copy, spare] = [new Float64Array(n * n), new Float64Array(n)];
  const core = time(() => {
    for (let k = 0; k < REPEATS_OF_SMALL; k += 1) nativeEigenvalues(a, n, re, im);
  }).median;
  const plain = time(() => {
    for (let k = 0; k < REPEATS_OF_SMALL; k += 1) {
      copy.set(a);
      balanceMatrix(copy, n);
      reduceToHessenberg(copy, n, spare);
      hessenbergEigenvalues(copy, n, re, im);
    }
  }).median;
  return told(`eigenvalues, n = ${n}: plain code over the core`, times(plain / core));
}

/** The same entries as in yardsticks/eigenvalues.py. */
function matrix(n: number): Float64Array {
  let seed = 20011;
  return Float64Array.from({ length: n * n }, () => {
    seed = (seed * 48271) % 2147483647;
    return seed / 2147483647 - 0.5;
  });
}
