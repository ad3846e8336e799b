/** Branches of cycles in the sweep in space: rings at some of the continued cycles. */
import type { CyclesResult } from '@/engine/cycles/contract';
import { specialPointGlyph } from '@/graphics/glyphs';

import { branchName, cyclePointSentence } from '../../cycles/cycle-words';
import { STABILITY_WORDS } from '../views/branch-runs';
import type { ViewInput } from '../views/view-input';
import type { ReadPoint, SpaceLine, SpacePoint } from './space-parts';

/** Rings along one branch, evenly spread over the range that it covers. */
const RINGS = 16;
const NOT_FEASIBLE = 0.3;
const RING_OPACITY = 0.75;

export function orbitPoints(
  orbit: Float64Array,
  dimension: number,
  read: ReadPoint,
  parameter: number,
): Float64Array {
  const count = orbit.length / dimension;
  const points = new Float64Array(count * 3);
  for (let k = 0; k < count; k++) points.set(read(orbit, k * dimension, NaN, parameter), 3 * k);
  return points;
}

/** Indices of cycles about equally far apart along the parameter, both ends among them. */
export function ringIndices(parameters: Float64Array, rings: number): readonly number[] {
  const count = parameters.length;
  const way = new Float64Array(count);
  for (let k = 1; k < count; k++)
    way[k] = (way[k - 1] ?? 0) + Math.abs((parameters[k] ?? NaN) - (parameters[k - 1] ?? NaN));
  const whole = way[count - 1] ?? 0;
  const chosen: number[] = [];
  for (let ring = 0, k = 0; ring < rings; ring++) {
    const target = (whole * ring) / Math.max(1, rings - 1);
    while (k + 1 < count && (way[k] ?? 0) < target * (1 - 1e-12)) k++;
    if (chosen.at(-1) !== k) chosen.push(k);
  }
  return chosen;
}

export function cycleRings(
  { palette, model, state }: ViewInput,
  result: CyclesResult,
  read: ReadPoint,
  isTwin: boolean,
): { readonly lines: readonly SpaceLine[]; readonly points: readonly SpacePoint[] } {
  const side = isTwin ? 'twin' : 'own';
  const colour = isTwin
    ? palette.twin
    : (palette.hues[model.populations.at(-1)?.hue ?? 'slate'][1] ?? palette.ink);
  const orbitOf = (branch: CyclesResult['branches'][number], k: number) => {
    const size = branch.orbitSamples * branch.dimension;
    return orbitPoints(
      branch.orbits.subarray(k * size, (k + 1) * size),
      branch.dimension,
      read,
      branch.parameters[k] ?? NaN,
    );
  };
  const lines = result.branches.flatMap((branch, index) =>
    ringIndices(branch.parameters, RINGS).map((k): SpaceLine => {
      const attracts = branch.attracts[k] ?? 2;
      return {
        id: `${side}:ring:${index}:${k}`,
        label: `${isTwin ? 'pooled twin, ' : ''}${branchName(branch.origin)}, ${STABILITY_WORDS[attracts] ?? 'undecided'}`,
        colour,
        dashed: attracts === 0,
        opacity: branch.feasible[k] === 1 ? RING_OPACITY : NOT_FEASIBLE,
        twin: isTwin,
        points: orbitOf(branch, k),
      };
    }),
  );
  const points = result.specialPoints.flatMap((point): SpacePoint[] => {
    const branch = result.branches[point.branch];
    const at = branch ? orbitOf(branch, point.index).subarray(0, 3) : null;
    if (!at) return [];
    return [
      {
        label: isTwin ? `${point.kind}, twin` : point.kind,
        description: `${isTwin ? 'Pooled twin: ' : ''}${cyclePointSentence(point)}`,
        at: [point.parameter, at[1] ?? NaN, at[2] ?? NaN],
        glyph: specialPointGlyph(point.kind),
        colour: isTwin ? palette.twin : state.selectedPoint?.id === point.id ? palette.accent : palette.ink,
        size: isTwin ? 6 : 7,
        named: point.feasible,
        twin: isTwin,
      },
    ];
  });
  return { lines, points };
}
