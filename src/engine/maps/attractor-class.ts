import type { CompiledSystem } from '../system/contract';
import type { AttractorClass, AttractorKind } from './contract';

/** What is left of a community, before populations that died out are named. */
export type LongRunKind = Exclude<AttractorKind, 'extinct'>;

/** A kind in words, with the populations that died out before it. */
export function attractorClass(
  system: CompiledSystem,
  kind: LongRunKind,
  options: {
    readonly windings?: number;
    readonly extinct?: readonly string[];
    readonly reason?: string;
  } = {},
): AttractorClass {
  const extinct = options.extinct ?? [];
  const windings = kind === 'cycle' ? (options.windings ?? null) : null;
  const otherwise = inWords(system, kind, windings, options.reason);
  if (extinct.length === 0) return { kind, windings, extinct, label: otherwise };
  const names = extinct.map(
    (symbol) => system.populations.find((one) => one.symbol === symbol)?.name ?? symbol,
  );
  const all = extinct.length === system.populations.length;
  const label = all ? 'everything extinct' : `${listed(names)} extinct, ${otherwise} otherwise`;
  return { kind: 'extinct', windings, extinct, label };
}

function inWords(
  system: CompiledSystem,
  kind: LongRunKind,
  windings: number | null,
  reason: string | undefined,
): string {
  switch (kind) {
    case 'cycle':
      if (windings === null) return 'cycle';
      if (!system.autonomous && system.forcingPeriod() !== null)
        return windings === 1
          ? 'cycle with the period of the forcing'
          : `cycle of ${windings} periods of the forcing`;
      return windings === 1 ? 'cycle' : `cycle of ${windings} turns`;
    case 'unbounded':
      return 'growth without bound';
    case 'undecided':
      return reason === undefined ? 'undecided' : `undecided: ${reason}`;
    default:
      return kind;
  }
}

function listed(names: readonly string[]): string {
  if (names.length < 2) return names.join('');
  return `${names.slice(0, -1).join(', ')} and ${names[names.length - 1]}`;
}

/** Numbers the different classes met on a map, in the order in which they are met. */
export class ClassList {
  readonly classes: AttractorClass[] = [];

  indexOf(one: AttractorClass): number {
    const known = this.classes.findIndex(({ label }) => label === one.label);
    if (known >= 0) return known;
    this.classes.push(one);
    return this.classes.length - 1;
  }
}
