import type { PresetDocument } from '@/engine/schema/preset';

/** Whether two documents hold the same, whatever objects they are made of. Parts they share are not looked into. */
export function sameDocument(a: PresetDocument, b: PresetDocument): boolean {
  const keys = new Set([...Object.keys(a), ...Object.keys(b)]) as Set<keyof PresetDocument>;
  return [...keys].every((key) => a[key] === b[key] || JSON.stringify(a[key]) === JSON.stringify(b[key]));
}
