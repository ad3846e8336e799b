import type { Branch, SweepResult } from '../continuation/contract';
import type { CycleBranch, CyclesResult } from '../cycles/contract';
import type { EquilibriaResult, Equilibrium } from '../equilibria/contract';
import type { CompiledModel } from '../system/compile-model';
import { inWords, listed } from '../verdict/wording';
import type { PictureResult, PictureRow } from './contract';
import { extentOf, whereItAttracts, type Between } from './stretches';

/** A density that never exceeds this share of the largest one is that of an absent population. */
const ABSENT = 1e-12;
const NOT_FEASIBLE = 'Not feasible: a density is negative.';

type PictureParts = Pick<PictureResult, 'equilibria' | 'sweep' | 'cycles'>;

/** The outcome of the whole: complete where all parts are, cancelled or failed with the reason of the first that was. */
export function pictureStatus({ sweep, cycles }: PictureParts): Pick<PictureResult, 'status' | 'message'> {
  const parts = [sweep.split, sweep.twin, cycles.split, cycles.twin].filter((one) => one !== null);
  const cancelled = parts.find((one) => one.status === 'cancelled');
  if (cancelled) return { status: 'cancelled', message: cancelled.message };
  const failed = parts.find((one) => one.status === 'failed');
  if (failed) return { status: 'failed', message: failed.message };
  // Under forcing nothing rests, so that the cycles of the period map are the whole picture.
  const rests = sweep.split.status === 'complete' ? [sweep.split.message] : [];
  return { status: 'complete', message: [...rests, cycles.split.message].join(' ') };
}

/**
 * The table of a full picture: equilibria at the present value, branches, special points, branches of cycles
 * and their special points, first of the model and then of its pooled twin.
 *
 * @param value of the swept parameter at the task's own numbers
 */
export function summarisePicture(
  model: CompiledModel,
  value: number,
  { equilibria, sweep, cycles }: PictureParts,
): readonly PictureRow[] {
  const words = new Words(model.system.populations);
  const side = (
    of: PictureRow['of'],
    found: EquilibriaResult,
    swept: SweepResult,
    along: CyclesResult | null,
  ): PictureRow[] =>
    [
      ...found.equilibria.map((one) => equilibriumRow(one, swept.stateSymbols, value, words)),
      ...swept.branches.map((branch, k) => branchRow(branch, words, k, swept.specialPoints)),
      ...swept.specialPoints.map(pointRow),
      ...(along ? along.branches.map((branch, k) => cyclesRow(branch, k, along)) : []),
      ...(along?.specialPoints ?? []).map(pointRow),
    ].map((row) => ({ of, ...row }));
  return [
    ...side('split', equilibria.split, sweep.split, cycles.split),
    ...(equilibria.twin && sweep.twin ? side('twin', equilibria.twin, sweep.twin, cycles.twin) : []),
  ];
}

type Row = Omit<PictureRow, 'of'>;

/** What equilibria and populations are called. */
class Words {
  private readonly names: ReadonlyMap<string, string>;

  constructor(populations: CompiledModel['system']['populations']) {
    this.names = new Map(populations.map((one) => [one.symbol, one.name]));
  }

  named(symbols: readonly string[]): string {
    return listed(symbols.map((symbol) => this.names.get(symbol) ?? symbol));
  }

  /** `coexistence equilibrium`, `equilibrium without Predators`, `empty equilibrium`. */
  equilibrium(absent: readonly string[]): string {
    if (absent.length === 0) return this.names.size > 1 ? 'coexistence equilibrium' : 'equilibrium';
    if (absent.length === this.names.size) return 'empty equilibrium';
    return `equilibrium without ${this.named(absent)}`;
  }
}

function equilibriumRow(one: Equilibrium, symbols: readonly string[], value: number, words: Words): Row {
  const at = symbols.map((symbol, i) => `${symbol} = ${inWords(one.state[i])}`).join(', ');
  const feasible = one.feasible ? '' : ` ${NOT_FEASIBLE}`;
  const invades = one.invasions
    .filter(({ answer }) => answer === 'can invade')
    .map(({ population }) => ` ${capital(words.named(population.split(' and ')))} can invade.`);
  return {
    what: words.equilibrium(one.absent),
    parameter: value,
    extent: null,
    note: `${capital(one.type)} at ${at}.${feasible}${invades.join('')}`,
  };
}

function branchRow(branch: Branch, words: Words, own: number, special: readonly Between[]): Row {
  const feasible = branch.feasible.some((flag) => flag === 1);
  const stability = feasible ? whereItAttracts(branch, own, special) : NOT_FEASIBLE;
  return {
    what: `branch of the ${words.equilibrium(branch.absent)}`,
    parameter: null,
    extent: extentOf(branch.parameters),
    note: `${stability} ${ends(branch)}`,
  };
}

function pointRow(point: {
  readonly kind: string;
  readonly parameter: number;
  readonly meaning: string;
  readonly feasible: boolean;
}): Row {
  const feasible = point.feasible ? '' : ` ${NOT_FEASIBLE}`;
  return { what: point.kind, parameter: point.parameter, extent: null, note: `${point.meaning}${feasible}` };
}

const ORIGINS: Readonly<Record<CycleBranch['origin']['kind'], string>> = {
  Hopf: 'the Hopf point',
  trajectory: 'a trajectory',
  'period map': 'the period map',
  'period doubling': 'the period doubling',
  'branch point of cycles': 'the branch point of cycles',
};

function cyclesRow(branch: CycleBranch, own: number, { branches, specialPoints }: CyclesResult): Row {
  const scale = Math.max(...branches.map(({ highest }) => extentOf(highest)[1]));
  const periods = extentOf(branch.periods);
  const period =
    inWords(periods[0]) === inWords(periods[1])
      ? `Period ${inWords(periods[0])}.`
      : `Period ${inWords(periods[0])} to ${inWords(periods[1])}.`;
  return {
    what: `cycle branch from ${ORIGINS[branch.origin.kind]}`,
    parameter: branch.origin.parameter,
    extent: extentOf(branch.parameters),
    note: `${whereItAttracts(branch, own, specialPoints)} ${period} ${lowestOf(branch, scale)} ${ends(branch)}`,
  };
}

/**
 * The lowest value of what is there at all along the branch, and where.
 *
 * @param scale the largest density on any branch
 */
function lowestOf({ lowest, highest, quantities, parameters }: CycleBranch, scale: number): string {
  const m = quantities.length;
  const present = quantities.map((_, i) => highest.some((value, k) => k % m === i && value > ABSENT * scale));
  let least = -1;
  lowest.forEach((value, k) => {
    if (present[k % m] && (least < 0 || value < lowest[least])) least = k;
  });
  if (least < 0) return 'Every density is zero.';
  const at = inWords(parameters[Math.floor(least / m)]);
  return `Lowest density ${inWords(lowest[least])}, of ${quantities[least % m]} at ${at}.`;
}

/** Why a branch ends on either side, said once where both are alike. */
function ends({ startEnd, endEnd }: Pick<Branch | CycleBranch, 'startEnd' | 'endEnd'>): string {
  return [...new Set([startEnd.message, endEnd.message])].join(' ');
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
