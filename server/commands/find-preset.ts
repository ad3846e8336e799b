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

const PRESET_FIELDS = `p.id, p.ownerId, p.labId, p.visibility, p.title, p.summary, p.tagLines, p.populations,
  p.headNumber, p.createdAt, p.changedAt, o.name AS ownerName, l.name AS labName`;
const PRESETS = 'presets p LEFT JOIN users o ON o.id = p.ownerId LEFT JOIN labs l ON l.id = p.labId';

const asPreset = ({ ownerName, labName, ...rest }: PresetRow): FoundPreset => ({
  ...rest,
  populations: JSON.parse(rest.populations) as FoundPreset['populations'],
  createdAt: new Date(rest.createdAt),
  changedAt: new Date(rest.changedAt),
  owner: named(rest.ownerId, ownerName),
  lab: named(rest.labId, labName),
});

/** A preset that has not been deleted, with names; refused as absent otherwise. */
export async function findPreset(
  { database }: Dependencies,
  id: string,
  transaction?: Transaction,
): Promise<FoundPreset> {
  const [row] = await database.read<PresetRow>(
    `SELECT ${PRESET_FIELDS} FROM ${PRESETS} WHERE p.id = $id AND p.deletedAt IS NULL`,
    { id },
    transaction,
  );
  if (row === undefined) throw refuseNotFound();
  return asPreset(row);
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

/** A preset with its head version, in one statement: what opening one reads. */
export async function findPresetAndHead(
  { database }: Dependencies,
  id: string,
): Promise<{ preset: FoundPreset; version: FoundVersion }> {
  const [row] = await database.read<PresetRow & Omit<VersionRow, 'presetId'>>(
    `SELECT ${PRESET_FIELDS}, v.number, v.note, v.authorId, u.name AS authorName, v.restoredFrom, v.savedAt, v.document
     FROM ${PRESETS} CROSS JOIN preset_versions v ON v.presetId = p.id AND v.number = p.headNumber
     LEFT JOIN users u ON u.id = v.authorId WHERE p.id = $id AND p.deletedAt IS NULL`,
    { id },
  );
  if (row === undefined) throw refuseNotFound();
  const { number, note, authorId, authorName, restoredFrom, savedAt, document, ...preset } = row;
  const version = { presetId: id, number, note, authorId, authorName, restoredFrom, savedAt, document };
  return { preset: asPreset(preset), version: asVersion(version) };
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
