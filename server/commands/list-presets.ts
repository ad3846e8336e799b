import { QueryTypes } from 'sequelize';

import type { PresetPage, PresetQuery } from '@/contract/presets';
import { roleMay } from '@/contract/rights';

import type { Dependencies } from '../dependencies';
import type { Person } from '../middleware/current-user';
import { presentSummary } from '../presenters/present-preset';

const ORDERS: Record<PresetQuery['sort'], { column: string; usual: 'ASC' | 'DESC' }> = {
  changed: { column: 'p.changedAt', usual: 'DESC' },
  created: { column: 'p.createdAt', usual: 'DESC' },
  title: { column: 'p.title COLLATE NOCASE', usual: 'ASC' },
  owner: { column: "COALESCE(u.name, '') COLLATE NOCASE", usual: 'ASC' },
};
const TAGS_SHOWN = 40;

/** Words as typed, each to be found at the beginning of a word; quoted, so that no operator is read into them. */
function wordsToMatch(search: string): string | null {
  const words = search.match(/[\p{L}\p{N}]+/gu) ?? [];
  return words.length === 0
    ? null
    : words
        .slice(0, 12)
        .map((word) => `"${word}"*`)
        .join(' ');
}

/** A page of the library as one person may see it. */
export async function listPresets(
  { database }: Dependencies,
  person: Person,
  query: PresetQuery,
): Promise<PresetPage> {
  const { sequelize, models } = database;
  const labs = person.memberships
    .filter(({ role }) => roleMay(role, 'view lab presets'))
    .map(({ labId }) => labId);
  const visible = `p.deletedAt IS NULL AND (p.visibility = 'starter' OR (p.visibility = 'private' AND p.ownerId = :me) OR (p.visibility = 'lab' AND p.labId IN (:labs)))`;
  const conditions = [visible];
  const match = wordsToMatch(query.search);
  if (query.search !== '') {
    conditions.push(
      match ? 'p.id IN (SELECT presetId FROM preset_words WHERE preset_words MATCH :match)' : '0',
    );
  }
  if (query.tag) conditions.push('p.id IN (SELECT presetId FROM preset_tags WHERE tag = :tag)');
  if (query.owner) conditions.push('p.ownerId = :owner');
  if (query.kind === 'starter') conditions.push("p.visibility = 'starter'");
  if (query.kind === 'own') conditions.push('p.ownerId = :me');
  if (query.kind === 'lab') conditions.push("p.visibility = 'lab'");
  const replacements = {
    me: person.id,
    labs: labs.length > 0 ? labs : [''],
    match,
    tag: query.tag,
    owner: query.owner === 'me' ? person.id : query.owner,
    limit: query.pageSize,
    offset: (query.page - 1) * query.pageSize,
    tags: TAGS_SHOWN,
  };
  const where = conditions.join(' AND ');
  const order = ORDERS[query.sort];
  const direction = query.order === undefined ? order.usual : query.order === 'ascending' ? 'ASC' : 'DESC';
  const select = <Row extends object>(statement: string) =>
    sequelize.query<Row>(statement, { replacements, type: QueryTypes.SELECT });

  const [ids, counts, tags, owners] = await Promise.all([
    select<{ id: string }>(
      `SELECT p.id FROM presets p LEFT JOIN users u ON u.id = p.ownerId WHERE ${where}
       ORDER BY ${order.column} ${direction}, p.id LIMIT :limit OFFSET :offset`,
    ),
    select<{ total: number }>(`SELECT COUNT(*) AS total FROM presets p WHERE ${where}`),
    select<{ tag: string; count: number }>(
      `SELECT t.tag AS tag, COUNT(*) AS count FROM preset_tags t JOIN presets p ON p.id = t.presetId WHERE ${visible}
       GROUP BY t.tag ORDER BY count DESC, t.tag LIMIT :tags`,
    ),
    select<{ id: string; name: string }>(
      `SELECT DISTINCT u.id, u.name FROM presets p JOIN users u ON u.id = p.ownerId WHERE ${visible} AND p.ownerId <> :me
       ORDER BY u.name LIMIT 200`,
    ),
  ]);
  const records = await models.Preset.findAll({
    where: { id: ids.map(({ id }) => id) },
    include: [{ association: 'owner' }, { association: 'lab' }],
  });
  const byId = new Map(records.map((record) => [record.id, record]));
  return {
    items: ids.flatMap(({ id }) => {
      const record = byId.get(id);
      return record ? [presentSummary(record)] : [];
    }),
    total: counts[0]?.total ?? 0,
    page: query.page,
    pageSize: query.pageSize,
    tags,
    owners,
  };
}
