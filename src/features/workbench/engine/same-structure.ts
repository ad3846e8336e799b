/** Tells an edit that needs a new compilation from one that only moves numbers. */
import type { PresetDocument } from '@/engine/schema/preset';

const NUMBERS = new Set(['value', 'start', 'standardError', 'survival', 'source', 'meaning', 'hue', 'shade']);
/** Values of these traits are checked together (they must sum to one), so moving one is structural. */
const CHECKED_TOGETHER = 'share-of-births';

function skeleton(value: unknown, dropped: ReadonlySet<string>): string {
  return JSON.stringify(value, (key, inner: unknown) => (dropped.has(key) ? undefined : inner));
}

const traitSkeleton = (trait: PresetDocument['traits'][number]) =>
  trait.role === CHECKED_TOGETHER
    ? skeleton({ ...trait, dial: 0 }, new Set(['standardError', 'survival', 'source', 'meaning']))
    : skeleton({ ...trait, dial: 0 }, NUMBERS);

/** Whether two documents compile to the same system up to the values of its parameters. */
export function sameStructure(a: PresetDocument, b: PresetDocument): boolean {
  if (a === b) return true;
  const alike = (key: keyof PresetDocument, dropped: ReadonlySet<string>) =>
    a[key] === b[key] || skeleton(a[key], dropped) === skeleton(b[key], dropped);
  const none = new Set<string>();
  return (
    alike('populations', NUMBERS) &&
    (a.traits === b.traits ||
      (a.traits.length === b.traits.length &&
        a.traits.every((trait, k) => {
          const other = b.traits[k];
          return trait === other || (other !== undefined && traitSkeleton(trait) === traitSkeleton(other));
        }))) &&
    alike('parameters', NUMBERS) &&
    alike('intermediates', none) &&
    alike('processes', none) &&
    alike('constantsOfMotion', none) &&
    alike('box', none) &&
    a.timeUnit === b.timeUnit &&
    a.densityUnit === b.densityUnit
  );
}

/** Whether anything that `explore` is given differs. */
export function sameNumbers(a: PresetDocument, b: PresetDocument): boolean {
  return (
    a.parameters === b.parameters &&
    a.traits === b.traits &&
    a.populations === b.populations &&
    a.spread === b.spread &&
    a.horizon === b.horizon &&
    a.view.showTwin === b.view.showTwin
  );
}
