import type { Eigenvalue } from '../equilibria/contract';
import { eigenvalues } from '../linalg/eigenvalues';

export const FLOQUET_DEFAULTS = {
  /** Turns of the orthogonal iteration; what has not separated by then has nearly equal size. */
  turns: 60,
  /** Share below which a block counts as separated. */
  separated: 1e-11,
  /** Below this ln |mu| the smallest multiplier follows from the divergence. */
  tiny: -6,
} as const;

export interface FloquetMultipliers {
  /** Without the trivial one, by falling modulus. */
  readonly nontrivial: readonly Eigenvalue[];
  /** ln |mu| of each, which stays meaningful where the multiplier itself underflows. */
  readonly logModuli: readonly number[];
  /** Multiplier along the flow, which is exactly 1 for a cycle; null for a forced model. */
  readonly trivial: number | null;
}

/**
 * Floquet multipliers from the maps G_k across the N intervals of a cycle, without ever forming their
 * product, so that tiny and huge ones are as accurate as the rest: the direction of the flow, which every
 * map carries along, is split off by Householder reflections, and the rest is brought to block triangular
 * form by orthogonal iteration around the cycle (the periodic form of simultaneous iteration; Golub & Van
 * Loan section 7.3 for the iteration, Bojanczyk, Golub & Van Dooren 1992 for the periodic form, from memory).
 *
 * @param maps G_k as maps[(k*n + r)*stride + c], c < n
 * @param flow direction of the flow at each mesh point, flow[k*n + i], N of them; null for a forced model
 */
export function floquetMultipliers(
  maps: Float64Array,
  stride: number,
  N: number,
  n: number,
  flow: Float64Array | null,
): FloquetMultipliers {
  if (flow === null) {
    const whole = new Float64Array(N * n * n);
    for (let r = 0; r < N * n; r += 1) for (let c = 0; c < n; c += 1) whole[r * n + c] = maps[r * stride + c];
    return { ...periodicEigenvalues(whole, N, n), trivial: null };
  }
  const size = n - 1;
  const reduced = new Float64Array(N * size * size);
  const here = new Float64Array(n);
  const next = new Float64Array(n);
  const column = new Float64Array(n);
  let logTrivial = 0;
  let sign = 1;
  for (let k = 0; k < N; k += 1) {
    const from = reflector(flow, k * n, n, here);
    const to = reflector(flow, ((k + 1) % N) * n, n, next);
    for (let c = 0; c < n; c += 1) {
      // Column c of the reflection at k, mapped across, reflected at k + 1.
      for (let r = 0; r < n; r += 1) {
        const row = (k * n + r) * stride;
        let sum = maps[row + c];
        for (let j = 0; j < n; j += 1) sum -= 2 * here[c] * here[j] * maps[row + j];
        column[r] = sum;
      }
      let dot = 0;
      for (let i = 0; i < n; i += 1) dot += next[i] * column[i];
      for (let i = 0; i < n; i += 1) column[i] -= 2 * dot * next[i];
      if (c === 0) {
        // Along the flow; the reflections may turn it.
        const along = column[0] * from * to;
        logTrivial += Math.log(
          Math.abs(along) * (lengthOf(flow, k * n, n) / lengthOf(flow, ((k + 1) % N) * n, n)),
        );
        if (along < 0) sign = -sign;
      } else for (let r = 1; r < n; r += 1) reduced[(k * size + r - 1) * size + c - 1] = column[r];
    }
  }
  return { ...periodicEigenvalues(reduced, N, size), trivial: sign * Math.exp(logTrivial) };
}

function lengthOf(v: Float64Array, at: number, n: number): number {
  let sum = 0;
  for (let i = 0; i < n; i += 1) sum += v[at + i] * v[at + i];
  return Math.sqrt(sum);
}

/** Unit vector h into `out` with (1 - 2 h h') v = s |v| e_1; returns s. */
function reflector(v: Float64Array, at: number, n: number, out: Float64Array): 1 | -1 {
  const length = lengthOf(v, at, n);
  const s = v[at] > 0 ? -1 : 1;
  for (let i = 0; i < n; i += 1) out[i] = v[at + i];
  out[0] -= s * length;
  const size = lengthOf(out, 0, n);
  for (let i = 0; i < n; i += 1) out[i] = size > 0 ? out[i] / size : 0;
  return s;
}

/**
 * Where the smallest multiplier is real and tiny, its size follows from the integral of the divergence
 * (Liouville: the product of all multipliers is exp of it): collocation at Gauss points hands on a strongly
 * contracting direction with the right sign and less than its full contraction.
 */
export function withDivergence(found: FloquetMultipliers, divergence: number): FloquetMultipliers {
  const last = found.nontrivial.length - 1;
  if (last < 0 || found.nontrivial[last].im !== 0 || !(found.logModuli[last] < FLOQUET_DEFAULTS.tiny))
    return found;
  const others = found.logModuli.slice(0, last).reduce((sum, log) => sum + log, 0);
  const log = divergence - others;
  if (!(log < FLOQUET_DEFAULTS.tiny)) return found;
  const sign = found.nontrivial[last].re < 0 ? -1 : 1;
  return {
    ...found,
    nontrivial: [...found.nontrivial.slice(0, last), { re: sign * Math.exp(log), im: 0 }],
    logModuli: [...found.logModuli.slice(0, last), log],
  };
}

/** Eigenvalues of A_{N-1} ... A_0 (each n*n, row-major, one after the other). */
export function periodicEigenvalues(
  maps: Float64Array,
  N: number,
  n: number,
): { readonly nontrivial: readonly Eigenvalue[]; readonly logModuli: readonly number[] } {
  if (n === 0) return { nontrivial: [], logModuli: [] };
  const Q = new Float64Array(n * n);
  const first = new Float64Array(n * n);
  const work = new Float64Array(n * n);
  // Triangular factors of the last turn.
  const R = new Float64Array(N * n * n);
  for (let i = 0; i < n; i += 1)
    for (let j = 0; j < n; j += 1) Q[i * n + j] = (i === j ? 1 : 0) + 0.1 * Math.sin(1 + 3 * i + 7 * j);
  orthonormalise(Q, n, work);
  const wrap = new Float64Array(n * n);
  let blocks: readonly number[] = [0];
  for (let turn = 0; turn < FLOQUET_DEFAULTS.turns; turn += 1) {
    first.set(Q);
    for (let k = 0; k < N; k += 1) {
      multiply(maps, k * n * n, Q, n, work);
      Q.set(work);
      orthonormalise(Q, n, work);
      R.set(work, k * n * n);
    }
    for (let i = 0; i < n; i += 1)
      for (let j = 0; j < n; j += 1) {
        let sum = 0;
        for (let l = 0; l < n; l += 1) sum += first[l * n + i] * Q[l * n + j];
        wrap[i * n + j] = sum;
      }
    blocks = separatedBlocks(wrap, n);
    if (blocks.length === n) break;
  }
  return readBlocks(R, wrap, blocks, N, n);
}

/** Where the subspace of the first columns closes on itself, a block begins. */
function separatedBlocks(wrap: Float64Array, n: number): readonly number[] {
  const starts = [0];
  for (let c = 1; c < n; c += 1) {
    let largest = 0;
    for (let i = c; i < n; i += 1)
      for (let j = 0; j < c; j += 1) largest = Math.max(largest, Math.abs(wrap[i * n + j]));
    if (largest < FLOQUET_DEFAULTS.separated) starts.push(c);
  }
  return starts;
}

function readBlocks(
  R: Float64Array,
  wrap: Float64Array,
  starts: readonly number[],
  N: number,
  n: number,
): { readonly nontrivial: readonly Eigenvalue[]; readonly logModuli: readonly number[] } {
  const found: { readonly value: Eigenvalue; readonly log: number }[] = [];
  for (const [b, from] of starts.entries()) {
    const size = (starts[b + 1] ?? n) - from;
    const product = new Float64Array(size * size);
    for (let i = 0; i < size; i += 1) product[i * size + i] = 1;
    const next = new Float64Array(size * size);
    let log = 0;
    for (let k = 0; k <= N; k += 1) {
      const source = k < N ? R : wrap;
      const at = k < N ? k * n * n : 0;
      let largest = 0;
      for (let i = 0; i < size; i += 1)
        for (let j = 0; j < size; j += 1) {
          let sum = 0;
          for (let l = 0; l < size; l += 1)
            sum += source[at + (from + i) * n + from + l] * product[l * size + j];
          next[i * size + j] = sum;
          largest = Math.max(largest, Math.abs(sum));
        }
      if (!(largest > 0)) {
        log = -Infinity;
        break;
      }
      log += Math.log(largest);
      for (let e = 0; e < next.length; e += 1) product[e] = next[e] / largest;
    }
    const { re, im } = eigenvalues(product, size);
    for (let i = 0; i < size; i += 1) {
      const factor = Math.exp(log);
      const modulus = Math.hypot(re[i], im[i]);
      const value = log === -Infinity ? { re: 0, im: 0 } : { re: re[i] * factor, im: im[i] * factor };
      found.push({ value, log: log === -Infinity ? log : log + Math.log(modulus) });
    }
  }
  found.sort((a, b) => b.log - a.log || b.value.im - a.value.im);
  return { nontrivial: found.map((one) => one.value), logModuli: found.map((one) => one.log) };
}

/** A_k Q into `out`. */
function multiply(maps: Float64Array, at: number, Q: Float64Array, n: number, out: Float64Array): void {
  for (let i = 0; i < n; i += 1)
    for (let j = 0; j < n; j += 1) {
      let sum = 0;
      for (let l = 0; l < n; l += 1) sum += maps[at + i * n + l] * Q[l * n + j];
      out[i * n + j] = sum;
    }
}

/** Modified Gram-Schmidt, twice over; the triangular factor goes to `R`. */
function orthonormalise(Q: Float64Array, n: number, R: Float64Array): void {
  R.fill(0);
  for (let c = 0; c < n; c += 1) {
    for (let pass = 0; pass < 2; pass += 1)
      for (let b = 0; b < c; b += 1) {
        let dot = 0;
        for (let i = 0; i < n; i += 1) dot += Q[i * n + b] * Q[i * n + c];
        R[b * n + c] += dot;
        for (let i = 0; i < n; i += 1) Q[i * n + c] -= dot * Q[i * n + b];
      }
    let squared = 0;
    for (let i = 0; i < n; i += 1) squared += Q[i * n + c] * Q[i * n + c];
    const length = Math.sqrt(squared);
    R[c * n + c] = length;
    // A column that vanished carries nothing on; any direction serves.
    for (let i = 0; i < n; i += 1) Q[i * n + c] = length > 0 ? Q[i * n + c] / length : i === c ? 1 : 0;
  }
}
