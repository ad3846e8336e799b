import type { SpecialPoint } from './contract';
import { withInvaders } from './special-points';
import type { SweepScope } from './sweep-scope';

/** Points nearer than this in the parameter and the states, as shares of their scales, are one. */
const SAME = { parameter: 1e-6, state: 1e-4 } as const;

/** Special points of a sweep; one that is seen from several branches is kept once. */
export class SpecialPointList {
  private readonly points: SpecialPoint[] = [];

  constructor(private readonly scope: SweepScope) {}

  record(point: SpecialPoint): void {
    const { parameterScale, stateScale } = this.scope;
    const twin = this.points.findIndex(
      (known) =>
        (known.kind === 'Hopf') === (point.kind === 'Hopf') &&
        Math.abs(known.parameter - point.parameter) < SAME.parameter * parameterScale &&
        known.state.every((value, i) => Math.abs(value - point.state[i]) < SAME.state * stateScale[i]),
    );
    if (twin < 0) this.points.push(point);
    else this.points[twin] = merged(this.points[twin], point);
  }

  /** By rising parameter, with their ids. */
  list(): SpecialPoint[] {
    const ordered = [...this.points].sort((a, b) => a.parameter - b.parameter);
    return ordered.map((point, k) => ({ ...point, id: `${point.kind}-${k + 1}` }));
  }
}

/** Of two views of one point the more telling, and of equals the sharper; invaders of both. */
function merged(known: SpecialPoint, point: SpecialPoint): SpecialPoint {
  const tells = (one: SpecialPoint): number => ['fold', 'branch point'].indexOf(one.kind) + 1 || 3;
  const better =
    tells(point) > tells(known) || (tells(point) === tells(known) && point.accuracy < known.accuracy);
  const kept = better ? point : known;
  const other = better ? known : point;
  const more = other.kind === kept.kind ? other.invades.filter((one) => !kept.invades.includes(one)) : [];
  return more.length === 0 ? kept : withInvaders(kept, [...kept.invades, ...more]);
}
