import type { Dependencies } from '../dependencies';
import { readDocument } from '../commands/assigned/known-facts';
import type { Person } from '../middleware/current-user';
import type { Preset } from '../models/preset';
import { fileName, jsonEntry, type ArchiveEntry } from './zip-stream';

const NEWEST_FIRST: [string, string][] = [['number', 'DESC']];

/** A preset with every version as its reader may see it, its links without what opens them, and its comments. */
export async function* presetEntries(
  dependencies: Dependencies,
  person: Person,
  preset: Preset,
): AsyncGenerator<ArchiveEntry> {
  const { PresetVersion, ShareLink, Comment } = dependencies.database.models;
  const folder = `presets/${fileName(preset.title)}-${fileName(preset.id)}`;
  const versions = await PresetVersion.findAll({
    where: { presetId: preset.id },
    attributes: { exclude: ['document'] },
    include: [{ association: 'author' }],
    order: NEWEST_FIRST,
  });
  const links = await ShareLink.findAll({ where: { presetId: preset.id } });
  const comments = await Comment.findAll({ where: { presetId: preset.id }, order: [['createdAt', 'ASC']] });
  yield jsonEntry(`${folder}/preset.json`, {
    title: preset.title,
    visibility: preset.visibility,
    lab: preset.lab?.name ?? null,
    owner: preset.owner?.name ?? null,
    createdAt: preset.createdAt,
    changedAt: preset.changedAt,
    versions: versions.map(({ number, author, savedAt, note, restoredFrom }) => ({
      number,
      author: author?.name ?? null,
      savedAt,
      note,
      restoredFrom,
    })),
    links: links.map(({ label, createdAt, expiresAt, revokedAt, access, opened, lastOpenedAt }) => ({
      label,
      createdAt,
      expiresAt,
      revokedAt,
      access,
      opened,
      lastOpenedAt,
    })),
  });
  const told = comments.filter(({ deletedAt }) => deletedAt === null);
  if (told.length > 0)
    yield jsonEntry(
      `${folder}/comments.json`,
      told.map(({ id, threadId, authorName, text, version, pin, createdAt, editedAt, resolvedAt }) => ({
        id,
        thread: threadId,
        author: authorName,
        text,
        version,
        pin,
        createdAt,
        editedAt,
        resolvedAt,
      })),
    );
  for (const { number } of versions) {
    const version = await PresetVersion.findOne({ where: { presetId: preset.id, number } });
    if (version === null) continue;
    const document = await readDocument(dependencies, person, preset, version);
    yield jsonEntry(`${folder}/version-${number}.moiety.json`, document);
  }
}
