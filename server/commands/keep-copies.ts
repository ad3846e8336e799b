import type { Transaction } from 'sequelize';

import { LIMITS } from '@/engine/schema/limits';
import type { PresetDocument } from '@/engine/schema/preset';

import type { Dependencies } from '../dependencies';
import { findVersion } from './find-preset';
import { insertPreset } from './preset-commands';

/** The presets of a person that a lab keeps when they go. */
export const presetsToKeep = (labId: string, ownerId: string) => ({ labId, ownerId, deletedAt: null });

/**
 * Gives someone who goes a private copy of each of their presets that the lab keeps, as it was last saved, so
 * that neither side loses work; returns how many.
 */
export async function keepCopies(
  dependencies: Dependencies,
  transaction: Transaction,
  owner: { id: string; name: string },
  lab: { id: string; name: string },
): Promise<number> {
  const presets = await dependencies.database.models.Preset.findAll({
    where: presetsToKeep(lab.id, owner.id),
    transaction,
  });
  for (const { id, headNumber } of presets) {
    const head = await findVersion(dependencies, id, headNumber, transaction);
    await insertPreset(dependencies, transaction, owner, {
      document: JSON.parse(head.document) as PresetDocument,
      text: head.document,
      note: `Kept when leaving “${lab.name}”`.slice(0, LIMITS.noteLength),
      placed: { visibility: 'private', labId: null },
    });
  }
  return presets.length;
}
