import type { BasinsTask, ExtremesTask, LyapunovTask, SectionTask } from '@/engine/schema/analysis-tasks';

import type { LongRunName } from '../state/long-run';
import type { WorkbenchState } from '../state/store';
import { commonTask } from './two-parameter-tasks';

export const LONG_RUN_NAMES: Readonly<Record<LongRunName, string>> = {
  extremes: 'Long-run extremes along the strip',
  basins: 'Basins of attraction',
  section: 'Section through the long run',
  lyapunov: 'Lyapunov exponents',
};

/** Values along the strip, and cells a side of the plane of starts: enough to see, quick enough to wait for. */
const VALUES = 160;
const CELLS = 48;
const CROSSINGS = 400;
/** The plane of start values reaches this many times the largest start or equilibrium. */
const BEYOND = 1.5;

type LongRunTask = ExtremesTask | BasinsTask | SectionTask | LyapunovTask;

/** Symbol that is observed: the one chosen, where the model still has it, else the first class. */
export function observedSymbol(state: WorkbenchState): string | null {
  const { observe } = state.longRun;
  const { populations } = state.document;
  const symbols = populations.flatMap((one) => [one.symbol, ...one.classes.map((member) => member.symbol)]);
  return observe !== null && symbols.includes(observe)
    ? observe
    : (populations[0]?.classes[0]?.symbol ?? null);
}

/** Value of the observed quantity at the coexistence equilibrium, else at the start. */
export function sectionLevel(state: WorkbenchState): number | null {
  if (state.longRun.level !== null) return state.longRun.level;
  const symbol = observedSymbol(state);
  const members = membersOf(state, symbol);
  const rest = state.result?.equilibria?.equilibria.find((one) => one.feasible && one.absent.length === 0);
  const classes = state.document.populations.flatMap((one) => one.classes);
  if (members.length === 0) return null;
  const value = members.reduce((sum, i) => sum + (rest?.state[i] ?? classes[i]?.start ?? 0), 0);
  return Number(value.toPrecision(6));
}

function membersOf(state: WorkbenchState, symbol: string | null): readonly number[] {
  const classes = state.document.populations.flatMap((population) =>
    population.classes.map((one) => ({ one, population })),
  );
  return classes.flatMap(({ one, population }, i) =>
    one.symbol === symbol || population.symbol === symbol ? [i] : [],
  );
}

/** The two classes of the plane of starts: the first of the first two populations, else of the first. */
export function planeOfStarts(state: WorkbenchState): readonly [string, string] | null {
  const firsts = state.document.populations.map((one) => one.classes[0]?.symbol ?? '');
  const all = state.document.populations.flatMap((one) => one.classes.map((member) => member.symbol));
  const [x, y] = firsts.length > 1 ? firsts : all;
  return x !== undefined && y !== undefined && x !== y ? [x, y] : null;
}

function upTo(state: WorkbenchState, symbol: string): number {
  const [index = -1] = membersOf(state, symbol);
  const start = state.document.populations
    .flatMap((one) => one.classes)
    .find((one) => one.symbol === symbol)?.start;
  const values = (state.result?.equilibria?.equilibria ?? [])
    .filter((one) => one.feasible)
    .map((one) => one.state[index] ?? 0);
  return Number((BEYOND * Math.max(start ?? 0, ...values, 1e-6)).toPrecision(2));
}

/** The task of a name at the numbers of the bench; null where it cannot be asked. */
export function longRunTask(state: WorkbenchState, name: LongRunName): LongRunTask | null {
  const common = commonTask(state);
  const observe = observedSymbol(state);
  if (observe === null) return null;
  switch (name) {
    case 'lyapunov':
      return { task: 'lyapunov', ...common };
    case 'extremes':
      return state.sweepSelection
        ? {
            task: 'extremes',
            ...common,
            ...state.sweepSelection,
            values: VALUES,
            directions: ['upward', 'downward'],
            observe,
          }
        : null;
    case 'basins': {
      const pair = planeOfStarts(state);
      if (!pair) return null;
      const axis = (symbol: string) => ({ state: symbol, from: 0, to: upTo(state, symbol), cells: CELLS });
      return { task: 'basins', ...common, x: axis(pair[0]), y: axis(pair[1]) };
    }
    case 'section': {
      const value = sectionLevel(state);
      if (value === null) return null;
      return {
        task: 'section',
        ...common,
        quantity: observe,
        value,
        direction: 'rising',
        crossings: CROSSINGS,
      };
    }
  }
}
