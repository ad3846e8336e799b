import type { CollocationBasis } from './collocation-basis';
import { onMesh, uniformMesh, type Orbit } from './orbit';

/** Share of the density that is spread evenly, so that no interval grows without bound. */
const EVEN_SHARE = 0.1;

/**
 * Mesh on which the local error is spread evenly: with the (m+1)-th derivative of the solution estimated
 * by differences of the piecewise constant m-th derivative, the density of mesh points follows its
 * (m+1)-th root (de Boor 1973; Ascher, Mattheij & Russell, section 9.1, from memory).
 *
 * @param intervals of the new mesh
 * @returns mesh points 0 = tau_0 < ... < tau_N = 1
 */
export function adaptMesh(basis: CollocationBasis, n: number, orbit: Orbit, intervals: number): Float64Array {
  const { m } = basis;
  const { mesh, values } = orbit;
  const N = mesh.length - 1;
  const top = new Float64Array(N * n);
  for (let k = 0; k < N; k += 1) {
    const scale = (mesh[k + 1] - mesh[k]) ** -m;
    for (let i = 0; i < n; i += 1) {
      let sum = 0;
      for (let j = 0; j <= m; j += 1) sum += basis.highest[j] * values[(k * m + j) * n + i];
      top[k * n + i] = sum * scale;
    }
  }
  // Jumps of the m-th derivative at the mesh points, over the distance of the midpoints; periodic.
  const jump = new Float64Array(N + 1);
  for (let k = 0; k <= N; k += 1) {
    const left = (k + N - 1) % N;
    const right = k % N;
    const distance = (mesh[left + 1] - mesh[left] + mesh[right + 1] - mesh[right]) / 2;
    let largest = 0;
    for (let i = 0; i < n; i += 1)
      largest = Math.max(largest, Math.abs(top[right * n + i] - top[left * n + i]) / distance);
    jump[k] = largest;
  }
  const density = new Float64Array(N);
  let total = 0;
  for (let k = 0; k < N; k += 1) {
    density[k] = ((jump[k] + jump[k + 1]) / 2) ** (1 / (m + 1));
    total += density[k] * (mesh[k + 1] - mesh[k]);
  }
  if (!(total > 0) || !Number.isFinite(total)) return intervals === N ? mesh : uniformMesh(intervals);
  for (let k = 0; k < N; k += 1) density[k] += EVEN_SHARE * total;
  return spreadEvenly(mesh, density, total * (1 + EVEN_SHARE), intervals);
}

function spreadEvenly(
  mesh: Float64Array,
  density: Float64Array,
  total: number,
  intervals: number,
): Float64Array {
  const out = new Float64Array(intervals + 1);
  let k = 0;
  let before = 0;
  for (let j = 1; j < intervals; j += 1) {
    const wanted = (total * j) / intervals;
    while (k < density.length - 1 && before + density[k] * (mesh[k + 1] - mesh[k]) < wanted) {
      before += density[k] * (mesh[k + 1] - mesh[k]);
      k += 1;
    }
    out[j] = mesh[k] + (wanted - before) / density[k];
  }
  out[intervals] = 1;
  return out;
}

/** The orbit on an adapted mesh; its values are interpolated and want correcting. */
export function adaptOrbit(basis: CollocationBasis, n: number, orbit: Orbit, intervals: number): Orbit {
  const mesh = adaptMesh(basis, n, orbit, intervals);
  if (mesh === orbit.mesh) return orbit;
  return { ...orbit, mesh, values: onMesh(basis, n, orbit.mesh, orbit.values, mesh) };
}
