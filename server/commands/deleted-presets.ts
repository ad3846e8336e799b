import { Op, type WhereOptions } from 'sequelize';

import { KEPT_DAYS, type DeletedPresetsBody } from '@/contract/deleted';
import { roleMay } from '@/contract/rights';

import { recordAudit } from '../audit/record-audit';
import type { Dependencies } from '../dependencies';
import { refuseNotFound } from '../errors';
import type { Person } from '../middleware/current-user';
import type { Database } from '../models/database';
import { demand } from '../policies/preset-policy';

const A_DAY = 24 * 60 * 60_000;
const KEPT = KEPT_DAYS * A_DAY;
const MOST_LISTED = 500;

const daysAgo = () => new Date(Date.now() - KEPT);

/** What a person may bring back: their own, and those of labs in which they may delete. */
function recoverable(person: Person): WhereOptions {
  const mine = person.memberships.map(({ labId }) => labId);
  const labs = person.memberships.filter(({ role }) => roleMay(role, 'delete lab presets'));
  return {
    deletedAt: { [Op.gte]: daysAgo() },
    [Op.or]: [
      { ownerId: person.id, labId: { [Op.or]: [null, mine] } },
      { labId: labs.map(({ labId }) => labId) },
    ],
  };
}

export async function listDeleted({ database }: Dependencies, person: Person): Promise<DeletedPresetsBody> {
  const presets = await database.models.Preset.findAll({
    where: recoverable(person),
    include: [{ association: 'owner' }],
    order: [['deletedAt', 'DESC']],
    limit: MOST_LISTED,
  });
  return {
    items: presets.map(({ id, title, owner, deletedAt }) => ({
      id,
      title,
      owner: owner?.name ?? '',
      deletedAt: (deletedAt ?? new Date()).toISOString(),
      goneAt: new Date((deletedAt ?? new Date()).getTime() + KEPT).toISOString(),
    })),
  };
}

/** Puts a deleted preset back where it was, with its versions; its links work again. */
export async function bringBack({ database }: Dependencies, person: Person, id: string): Promise<void> {
  await database.change(async (transaction) => {
    const { Preset } = database.models;
    const preset = await Preset.findOne({
      where: { id, deletedAt: { [Op.gte]: daysAgo() } },
      transaction,
    });
    if (preset === null) throw refuseNotFound('There is no deleted preset of that name to bring back.');
    demand(person, 'delete', preset);
    await Preset.update({ deletedAt: null }, { where: { id }, transaction });
    await recordAudit(database, transaction, {
      actor: person,
      action: 'preset brought back',
      labId: preset.labId,
      subject: preset.title,
      details: { preset: id },
    });
  });
}

/** Deletes for good what was deleted longer ago than it is kept; returns how many. */
export async function purgeDeleted(database: Database): Promise<number> {
  const { Preset } = database.models;
  const old = await Preset.findAll({ where: { deletedAt: { [Op.lt]: daysAgo() } } });
  for (const { id, title, labId } of old) {
    await database.change(async (transaction) => {
      // Past the model, which deletes no version; the file's own trigger checks the 30 days again.
      await database.sequelize.query('DELETE FROM preset_versions WHERE presetId = ?', {
        replacements: [id],
        transaction,
      });
      await Preset.destroy({ where: { id }, transaction });
      await recordAudit(database, transaction, {
        actor: { id: 'server', name: 'The server' },
        action: 'preset purged',
        labId,
        subject: title,
        details: { preset: id },
      });
    });
  }
  return old.length;
}

/** Purges now and once a day; the returned function ends it. */
export async function purgeDaily(database: Database, onFault: (error: unknown) => void): Promise<() => void> {
  await purgeDeleted(database);
  const timer = setInterval(() => void purgeDeleted(database).catch(onFault), A_DAY);
  timer.unref();
  return () => clearInterval(timer);
}
