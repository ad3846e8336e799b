import { STARTER_PRESETS } from '@/presets';

import type { Database } from '../models/database';
import { populationsOf } from '../presenters/present-preset';

/** Puts the starter presets into the library; one that changed with the product gets a new version. */
export async function seedStarters(database: Database): Promise<void> {
  const { Preset, PresetVersion, PresetTag } = database.models;
  for (const { id: starterKey, document } of STARTER_PRESETS) {
    const text = JSON.stringify(document);
    const id = `starter-${starterKey}`;
    await database.change(async (transaction) => {
      const known = await Preset.findByPk(id, { transaction });
      const head =
        known &&
        (await PresetVersion.findOne({ where: { presetId: id, number: known.headNumber }, transaction }));
      if (head?.document === text) return;
      const now = new Date();
      const number = (known?.headNumber ?? 0) + 1;
      const shown = {
        title: document.title,
        summary: document.summary,
        tagLines: document.tags.join('\n'),
        populations: populationsOf(document),
        headNumber: number,
        changedAt: now,
      };
      if (known) await Preset.update(shown, { where: { id }, transaction });
      else {
        await Preset.create(
          { id, starterKey, ownerId: null, labId: null, visibility: 'starter', createdAt: now, ...shown },
          { transaction },
        );
      }
      const note = known ? 'Changed with the product' : 'Came with the product';
      await PresetVersion.create(
        { presetId: id, number, document: text, note, authorId: null, savedAt: now },
        { transaction },
      );
      await PresetTag.destroy({ where: { presetId: id }, transaction });
      await PresetTag.bulkCreate(
        document.tags.map((tag) => ({ presetId: id, tag })),
        { transaction },
      );
    });
  }
}
