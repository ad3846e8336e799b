import { scaledNorm, type MethodSetting } from './one-step-method';

/**
 * First step size from the sizes of the state, its slope, and the change of the slope over a trial
 * Euler step. Source: Hairer, Norsett & Wanner I, sect. II.4 (from memory). Costs one evaluation.
 *
 * @param u state at t. @param slope f(t, u). @param span signed length of the integration.
 * @returns Signed step, at most the span.
 */
export function chooseInitialStep(
  setting: MethodSetting,
  t: number,
  u: Float64Array,
  slope: Float64Array,
  span: number,
  order: number,
): number {
  const n = u.length;
  const size = scaledNorm(u, u, u, setting, n);
  const speed = scaledNorm(slope, u, u, setting, n);
  const limit = Math.abs(span);
  let h = size < 1e-10 || speed < 1e-10 ? 1e-6 : (0.01 * size) / speed;
  h = Math.sign(span) * Math.min(h, limit);
  const trial = new Float64Array(n);
  const slopeThere = new Float64Array(n);
  for (let i = 0; i < n; i += 1) trial[i] = u[i] + h * slope[i];
  setting.system.rhs(t + h, trial, slopeThere);
  for (let i = 0; i < n; i += 1) slopeThere[i] -= slope[i];
  const bend = scaledNorm(slopeThere, u, u, setting, n) / Math.abs(h);
  const strongest = Math.max(speed, bend);
  const fromBend =
    strongest <= 1e-15 ? Math.max(1e-6, Math.abs(h) * 1e-3) : (0.01 / strongest) ** (1 / order);
  const chosen = Math.min(100 * Math.abs(h), fromBend, limit);
  return Math.sign(span) * (Number.isFinite(chosen) && chosen > 0 ? chosen : Math.abs(h));
}
