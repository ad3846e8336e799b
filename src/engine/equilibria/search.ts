import type { Progress } from '../continuation/contract';
import type { CompiledSystem } from '../system/contract';
import { boxScale, insideBox, makeBox, widenedBox, type StateBox } from './box';
import type { EquilibriaResult, Equilibrium } from './contract';
import type { DescriptionOptions } from './describe';
import { FaceSearch } from './face-search';
import { invariantFaces } from './faces';

/**
 * All equilibria in a box: on every invariant face of the state space (absent populations), Newton's
 * method from many starts with deflation of what was found, starts carried along trajectories, and
 * a scan where one state is free. Guessed sides of the box grow with what is found.
 * No proof of completeness; the message says how much was tried. A generator that yields its progress
 * with what was found so far, so that it can be driven in slices and stopped.
 */
export interface SearchOptions extends DescriptionOptions {
  /** Entered ranges per state, null where the box is to be guessed from the starts. */
  readonly box?: readonly ({ readonly from: number; readonly to: number } | null)[];
  /** States to start from as well: start values of trajectories, their ends, equilibria known before. */
  readonly starts?: readonly Float64Array[];
  readonly seed?: number;
  /** Newton runs in all, over all faces. */
  readonly maximumStarts?: number;
  /** Asked between slices; true stops the search with what was found. */
  readonly isCancelled?: () => boolean;
}

export const SEARCH_DEFAULTS = {
  seed: 1,
  maximumStarts: 6_000,
  /** A face of m free states gets this many starts, budget allowing: base + each * m. */
  startsBase: 32,
  startsEach: 24,
  startsLeast: 12,
  /** Passes over a box that grows. */
  passes: 3,
  /** States beyond an entered side by this share of its length still count as inside. */
  boxSlack: 1e-9,
} as const;

export const NEEDS_PERIOD_MAP =
  'The formulas contain the time t, so that no state rests. What repeats from season to season are the fixed points of the period map, which are followed as cycles along a parameter.';

/** @param p values of the parameters, in the order of `system.parameterKeys`; set on the system */
export function* findEquilibria(
  system: CompiledSystem,
  p: Float64Array,
  options: SearchOptions = {},
): Generator<Progress<EquilibriaResult>, EquilibriaResult> {
  const starts = options.starts ?? [];
  let box = makeBox(system, starts, options.box ?? []);
  if (!system.autonomous) return result('needs-period-map', NEEDS_PERIOD_MAP, [], box, 0);
  system.setParameters(p);
  let found: Equilibrium[] = [];
  let tried = 0;
  let capped = false;
  let faceCount = 0;
  for (let pass = 0; pass < SEARCH_DEFAULTS.passes; pass += 1) {
    const list = invariantFaces(system, box.to);
    capped = list.capped;
    faceCount = list.faces.length;
    const scale = boxScale(box);
    const perFace = Math.floor((options.maximumStarts ?? SEARCH_DEFAULTS.maximumStarts) / list.faces.length);
    for (const [k, face] of list.faces.entries()) {
      const wanted = SEARCH_DEFAULTS.startsBase + SEARCH_DEFAULTS.startsEach * face.free.length;
      const search = new FaceSearch(system, face, list.faces, box, scale, found, {
        seed: options.seed ?? SEARCH_DEFAULTS.seed,
        starts: Math.max(SEARCH_DEFAULTS.startsLeast, Math.min(wanted, perFace)),
        given: starts,
        describe: options,
      });
      while (search.advance()) {
        const partial = result('cancelled', 'Stopped before the end.', found, box, tried + search.tried);
        yield {
          fraction: (pass + (k + search.fraction) / list.faces.length) / SEARCH_DEFAULTS.passes,
          stage: `looking for equilibria, face ${k + 1} of ${list.faces.length}`,
          partial,
        };
        if (options.isCancelled?.())
          return { ...partial, message: `Stopped before the end; ${found.length} found so far.` };
      }
      tried += search.tried;
    }
    let wider: StateBox | null = null;
    for (const equilibrium of found) wider = widenedBox(system, wider ?? box, equilibrium.state) ?? wider;
    if (wider === null) break;
    box = wider;
  }
  const entered = box;
  found = found.filter((e) => insideBox(entered, e.state, SEARCH_DEFAULTS.boxSlack));
  return result('complete', completeMessage(found, tried, faceCount, capped), found, box, tried);
}

function completeMessage(
  found: readonly Equilibrium[],
  tried: number,
  faces: number,
  capped: boolean,
): string {
  const count = found.length === 1 ? '1 equilibrium' : `${found.length} equilibria`;
  const where = faces === 1 ? 'one face' : `${faces} faces`;
  const text = `Found ${count} from ${tried} starts on ${where} of the state box; a search from starts is no proof that there are no more.`;
  return capped
    ? `${text} There were more combinations of absent classes than the search looks at; those with about half of the classes absent were left out.`
    : text;
}

function result(
  status: EquilibriaResult['status'],
  message: string,
  found: readonly Equilibrium[],
  box: StateBox,
  startsTried: number,
): EquilibriaResult {
  return {
    status,
    message,
    equilibria: [...found].sort(byPresence),
    box: Array.from(box.from, (from, i) => ({ from, to: box.to[i] })),
    startsTried,
  };
}

/** Coexistence first, then by falling first state in which they differ. */
function byPresence(a: Equilibrium, b: Equilibrium): number {
  if (a.absent.length !== b.absent.length) return a.absent.length - b.absent.length;
  for (let i = 0; i < a.state.length; i += 1) if (a.state[i] !== b.state[i]) return b.state[i] - a.state[i];
  return 0;
}
