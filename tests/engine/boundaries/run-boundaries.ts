import type { BoundariesResult, BoundaryCurve, BoundaryKind } from '@/engine/boundaries/contract';
import { traceBoundaries, type BoundariesOptions } from '@/engine/boundaries/trace-boundaries';
import type { CompiledSystem } from '@/engine/system/contract';

import { finish } from '../../support/equations';

type Axis = readonly [key: string, from: number, to: number];

/** Boundaries of a textbook system over two parameters, by name. */
export function boundariesOf(
  system: CompiledSystem,
  [first, a, b]: Axis,
  [second, c, d]: Axis,
  options: Partial<BoundariesOptions> = {},
): BoundariesResult {
  return finish(
    traceBoundaries(system, system.defaults, {
      firstIndex: system.parameterKeys.indexOf(first),
      firstRange: [a, b],
      secondIndex: system.parameterKeys.indexOf(second),
      secondRange: [c, d],
      kinds: ['fold', 'Hopf', 'transcritical', 'pitchfork'],
      starts: [new Float64Array(system.dimension).fill(0.5)],
      ...options,
    }),
  );
}

/** The only curve of a kind, or a failed test with what was said. */
export function onlyCurve(result: BoundariesResult, kind: BoundaryKind): BoundaryCurve {
  const found = result.curves.filter((one) => one.kind === kind);
  const [curve] = found;
  if (found.length !== 1 || curve === undefined)
    throw new Error(`${found.length} curves of ${kind}. ${result.message}`);
  return curve;
}

/** Points of a curve as pairs of parameters. */
export function pairsOf(curve: BoundaryCurve): [number, number][] {
  return Array.from(curve.first, (first, k) => [first, curve.second[k]!]);
}
