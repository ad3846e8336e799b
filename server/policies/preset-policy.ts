import { PRESET_RIGHTS, roleMay, type LabRight, type PresetRight } from '@/contract/rights';

import { refuseNotAllowed, refuseNotFound } from '../errors';
import type { Person } from '../middleware/current-user';
import type { Preset } from '../models/preset';

type Record = Pick<Preset, 'ownerId' | 'labId' | 'visibility'>;

/** Right within the lab that stands for a right on a preset open to it. */
const BY_LAB: Partial<{ [R in PresetRight]: LabRight }> = {
  view: 'view lab presets',
  duplicate: 'view lab presets',
  comment: 'view lab presets',
  save: 'save lab presets',
  restore: 'save lab presets',
  'share by link': 'share lab presets by link',
  delete: 'delete lab presets',
};

/** What one opened to a lab stays with the lab when one goes. */
function leftBehind(person: Person, { visibility, labId }: Record): boolean {
  return visibility === 'lab' && !person.memberships.some((one) => one.labId === labId);
}

export function may(person: Person, right: PresetRight, preset: Record): boolean {
  if (preset.visibility === 'starter') return right === 'view' || right === 'duplicate';
  if (preset.ownerId === person.id && !leftBehind(person, preset)) return true;
  const needed = BY_LAB[right];
  if (preset.visibility !== 'lab' || needed === undefined) return false;
  const role = person.memberships.find((one) => one.labId === preset.labId)?.role;
  return role !== undefined && roleMay(role, needed);
}

export function rightsOn(person: Person, preset: Record): PresetRight[] {
  return PRESET_RIGHTS.filter((right) => may(person, right, preset));
}

/** What one may not see does not exist; what one may not do is refused by name. */
export function demand(person: Person, right: PresetRight, preset: Record): void {
  if (!may(person, 'view', preset)) throw refuseNotFound();
  if (may(person, right, preset)) return;
  if (preset.visibility === 'starter') {
    throw refuseNotAllowed('Starter presets stay as they are. Duplicate it to make it your own.');
  }
  throw refuseNotAllowed(
    `Your role in this lab does not let you ${right} this preset. Duplicate it to work on a copy.`,
  );
}

/** Whether a person may open a preset to a lab. */
export function mayPlaceIn(person: Person, labId: string): boolean {
  const role = person.memberships.find((one) => one.labId === labId)?.role;
  return role !== undefined && roleMay(role, 'create lab presets');
}
