import type { SpecialPoint } from '../continuation/contract';
import { complexEigenvector } from '../linalg/eigenvectors';
import type { CycleCurve, CyclePoint } from './cycle-curve';
import { nodeTimes, uniformMesh, type Orbit } from './orbit';

/** Sizes of the first cycle that are tried, in scaled coordinates. */
const FIRST_SIZES = [0.01, 0.003, 0.03, 0.001, 1e-4] as const;

/**
 * First cycle of the branch that begins at a Hopf point: the equilibrium plus a small multiple of the real
 * part of q exp(i omega t), with A q = i omega q, corrected. Its tangent points to larger cycles. Null where
 * no size of the first step converges.
 *
 * @param curve on coordinates in which the states present at the Hopf point are logarithms
 */
export function beginAtHopf(curve: CycleCurve, hopf: SpecialPoint): CyclePoint | null {
  const { cycles, N, m } = curve;
  const { n } = cycles;
  const omega = hopf.hopf?.omega;
  if (omega === undefined) return null;
  cycles.setParameter(hopf.parameter);
  const w = new Float64Array(n);
  cycles.toCoordinates(hopf.state, w);
  const J = new Float64Array(n * n);
  cycles.jacobian(0, w, J);
  const q = complexEigenvector(J, n, 0, omega);
  const mesh = uniformMesh(N);
  const times = nodeTimes(mesh, m);
  const along = curve.newDirection();
  const still = new Float64Array(times.length * n);
  for (let k = 0; k < times.length; k += 1) {
    const angle = k === times.length - 1 ? 0 : 2 * Math.PI * times[k];
    for (let i = 0; i < n; i += 1) {
      along.values[k * n + i] = q.re[i] * Math.cos(angle) - q.im[i] * Math.sin(angle);
      still[k * n + i] = w[i];
    }
  }
  if (!curve.normalise(mesh, along)) return null;
  const from: Orbit = {
    mesh,
    values: still,
    logPeriod: Math.log((2 * Math.PI) / omega),
    parameter: hopf.parameter,
  };
  for (const size of FIRST_SIZES) {
    // A resting orbit has no phase, so that of the predicted cycle is held.
    const point = curve.correct(from, along, size, curve.moved(from, along, size));
    if (point) return point;
  }
  return null;
}

/** Root mean square distance of a cycle from its mean, in scaled coordinates. */
export function sizeOfCycle(curve: CycleCurve, orbit: Orbit): number {
  const { n } = curve.cycles;
  const nodes = orbit.values.length / n - 1;
  let squared = 0;
  for (let i = 0; i < n; i += 1) {
    let mean = 0;
    for (let k = 0; k < nodes; k += 1) mean += orbit.values[k * n + i] / nodes;
    for (let k = 0; k < nodes; k += 1) squared += (orbit.values[k * n + i] - mean) ** 2 / nodes;
  }
  return Math.sqrt(squared);
}
