import type { Transaction } from 'sequelize';

import type { PresetSummary } from '@/contract/presets';

import type { Dependencies } from '../dependencies';
import { refuseNotFound } from '../errors';

interface Named {
  id: string;
  name: string;
}

/** A preset that has not been deleted, with names. */
export interface FoundPreset {
  id: string;
  ownerId: string | null;
  labId: string | null;
  visibility: PresetSummary['visibility'];
  title: string;
  summary: string;
  tagLines: string;
  populations: PresetSummary['populations'];
  headNumber: number;
  createdAt: Date;
  changedAt: Date;
  owner: Named | null;
  lab: Named | null;
}

/** One of its versions; null for the author of what came with the product. */
export interface FoundVersion {
  presetId: string;
  number: number;
  document: string;
  note: string;
  author: Named | null;
  restoredFrom: number | null;
  savedAt: Date;
}

type PresetRow = Omit<FoundPreset, 'populations' | 'createdAt' | 'changedAt' | 'owner' | 'lab'> &
  Record<'populations' | 'createdAt' | 'changedAt', string> &
  Record<'ownerName' | 'labName', string | null>;

const named = (id: string | null, name: string | null) => (id === null ? null : { id, name: name ?? '' });

/** A preset that the person may see, with names; refused as absent otherwise. */
export async function findPreset(
  { database }: Dependencies,
  id: string,
  transaction?: Transaction,
): Promise<FoundPreset> {
  const [row] = await database.read<PresetRow>(
    `SELECT p.id, p.ownerId, p.labId, p.visibility, p.title, p.summary, p.tagLines, p.populations, p.headNumber,
       p.createdAt, p.changedAt, u.name AS ownerName, l.name AS labName
     FROM presets p LEFT JOIN users u ON u.id = p.ownerId LEFT JOIN labs l ON l.id = p.labId
     WHERE p.id = $id AND p.deletedAt IS NULL`,
    { id },
    transaction,
  );
  if (row === undefined) throw refuseNotFound();
  const { ownerName, labName, ...rest } = row;
  return {
    ...rest,
    populations: JSON.parse(row.populations) as FoundPreset['populations'],
    createdAt: new Date(row.createdAt),
    changedAt: new Date(row.changedAt),
    owner: named(row.ownerId, ownerName),
    lab: named(row.labId, labName),
  };
}

type VersionRow = Omit<FoundVersion, 'author' | 'savedAt'> & {
  savedAt: string;
  authorId: string | null;
  authorName: string | null;
};

const VERSION_FIELDS =
  'v.presetId, v.number, v.note, v.authorId, u.name AS authorName, v.restoredFrom, v.savedAt';
const VERSIONS = 'preset_versions v LEFT JOIN users u ON u.id = v.authorId';

function asVersion<Row extends Omit<VersionRow, 'document'>>({ authorId, authorName, ...rest }: Row) {
  return { ...rest, author: named(authorId, authorName), savedAt: new Date(rest.savedAt) };
}

export async function findVersion(
  { database }: Dependencies,
  presetId: string,
  number: number,
  transaction?: Transaction,
): Promise<FoundVersion> {
  const [row] = await database.read<VersionRow>(
    `SELECT ${VERSION_FIELDS}, v.document FROM ${VERSIONS} WHERE v.presetId = $presetId AND v.number = $number`,
    { presetId, number },
    transaction,
  );
  if (row === undefined) throw refuseNotFound('This preset has no version of that number.');
  return asVersion(row);
}

/** Newest first, without documents; `total` counts them all. */
export async function listVersions(
  { database }: Dependencies,
  presetId: string,
  { limit, offset }: { limit: number; offset: number },
): Promise<{ versions: Omit<FoundVersion, 'document'>[]; total: number }> {
  const rows = await database.read<Omit<VersionRow, 'document'>>(
    `SELECT ${VERSION_FIELDS} FROM ${VERSIONS} WHERE v.presetId = $presetId
     ORDER BY v.number DESC LIMIT $limit OFFSET $offset`,
    { presetId, limit, offset },
  );
  const [count] = await database.read<{ total: number }>(
    'SELECT COUNT(*) AS total FROM preset_versions WHERE presetId = $presetId',
    { presetId },
  );
  return { versions: rows.map(asVersion), total: count?.total ?? 0 };
}
