import type { Transaction } from 'sequelize';

import { LIMITS } from '@/engine/schema/limits';
import type { PresetDocument } from '@/engine/schema/preset';

import type { AuditAction } from '@/contract/audit';

import { recordAudit } from '../audit/record-audit';
import type { Dependencies } from '../dependencies';
import { Refusal, refuseNotAllowed, refuseNotFound, refuseStaleSave } from '../errors';
import { makeId } from '../ids';
import type { Person } from '../middleware/current-user';
import type { Preset } from '../models/preset';
import { demand, mayPlaceIn } from '../policies/preset-policy';
import { populationsOf } from '../presenters/present-preset';
import { readDocument, withHiddenFacts } from './assigned/known-facts';
import { checkDocument } from './check-document';
import {
  findPreset,
  findPresetAndHead,
  findVersion,
  type FoundPreset,
  type FoundVersion,
} from './find-preset';

export interface PresetAndVersion {
  preset: FoundPreset;
  version: FoundVersion;
}

const onOneLine = (tag: string) => tag.replace(/\s+/g, ' ');

const shownFields = (document: PresetDocument) => ({
  title: document.title,
  summary: document.summary,
  tagLines: document.tags.map(onOneLine).join('\n'),
  populations: populationsOf(document),
});

async function replaceTags(
  { database }: Dependencies,
  presetId: string,
  tags: readonly string[],
  transaction: Transaction,
) {
  const { PresetTag } = database.models;
  await PresetTag.destroy({ where: { presetId }, transaction });
  const distinct = [...new Map(tags.map(onOneLine).map((tag) => [tag.toLowerCase(), tag])).values()];
  if (distinct.length > 0) {
    await PresetTag.bulkCreate(
      distinct.map((tag) => ({ presetId, tag })),
      { transaction },
    );
  }
}

export const auditPreset = (
  { database }: Dependencies,
  transaction: Transaction,
  actor: { id: string; name: string } | null,
  action: AuditAction,
  { id, title, labId }: Pick<Preset, 'id' | 'title' | 'labId'>,
  details: Record<string, string | number> = {},
) =>
  recordAudit(database, transaction, {
    actor,
    action,
    labId,
    subject: title,
    details: { preset: id, ...details },
  });

export interface NewPreset {
  document: PresetDocument;
  note: string;
  visibility: 'private' | 'lab';
  labId: string | null;
}

interface CheckedPreset {
  document: PresetDocument;
  /** The document as it is kept. */
  text: string;
  note: string;
  placed: { visibility: 'private' | 'lab'; labId: string | null };
}

/** Writes a preset with its first version, in the transaction of the change that it belongs to; its document has been checked. */
export async function insertPreset(
  dependencies: Dependencies,
  transaction: Transaction,
  owner: { id: string; name: string },
  { document, text, note, placed }: CheckedPreset,
): Promise<string> {
  const { Preset, PresetVersion } = dependencies.database.models;
  const id = makeId();
  const now = new Date();
  await Preset.create(
    {
      id,
      ownerId: owner.id,
      ...placed,
      ...shownFields(document),
      headNumber: 1,
      createdAt: now,
      changedAt: now,
    },
    { transaction },
  );
  await PresetVersion.create(
    { presetId: id, number: 1, document: text, note, authorId: owner.id, savedAt: now },
    { transaction },
  );
  await replaceTags(dependencies, id, document.tags, transaction);
  const { title } = document;
  await auditPreset(dependencies, transaction, owner, 'preset created', { id, title, labId: placed.labId });
  return id;
}

export async function createPreset(
  dependencies: Dependencies,
  person: Person,
  { document, note, visibility, labId }: NewPreset,
): Promise<PresetAndVersion> {
  const placed = placement(person, visibility, labId);
  const text = checkDocument(document);
  const id = await dependencies.database.change((transaction) =>
    insertPreset(dependencies, transaction, person, { document, text, note, placed }),
  );
  return findPresetAndHead(dependencies, id);
}

function placement(person: Person, visibility: 'private' | 'lab', labId: string | null) {
  if (visibility === 'private') return { visibility, labId: null };
  const lab = labId ?? (person.memberships.length === 1 ? (person.memberships[0]?.labId ?? null) : null);
  if (lab === null || !person.memberships.some((one) => one.labId === lab)) {
    throw refuseNotFound('You are in no lab of that name.');
  }
  if (!mayPlaceIn(person, lab))
    throw refuseNotAllowed('Your role in this lab does not let you open presets to it.');
  return { visibility, labId: lab };
}

interface Save {
  document: PresetDocument;
  note: string;
  baseVersion: number;
  restoredFrom?: number;
}

/** Adds a version on top of the one it began from; refused when another was saved in between. */
export async function saveVersion(
  dependencies: Dependencies,
  person: Person,
  id: string,
  save: Save,
): Promise<PresetAndVersion> {
  const { Preset, PresetVersion } = dependencies.database.models;
  const given = checkDocument(save.document);
  await dependencies.database.change(async (transaction) => {
    const preset = await findPreset(dependencies, id, transaction);
    demand(person, save.restoredFrom === undefined ? 'save' : 'restore', preset);
    const readHead = () => findVersion(dependencies, id, preset.headNumber, transaction);
    if (preset.headNumber !== save.baseVersion) {
      const head = await readHead();
      throw refuseStaleSave({
        number: head.number,
        author: head.author?.name ?? 'Someone',
        savedAt: head.savedAt.toISOString(),
        note: head.note,
      });
    }
    const document =
      save.restoredFrom === undefined
        ? await withHiddenFacts(dependencies, transaction, person, preset, { readHead, next: save.document })
        : save.document;
    const text = document === save.document ? given : checkDocument(document);
    const number = preset.headNumber + 1;
    const now = new Date();
    await PresetVersion.create(
      {
        presetId: id,
        number,
        document: text,
        note: save.note,
        authorId: person.id,
        restoredFrom: save.restoredFrom ?? null,
        savedAt: now,
      },
      { transaction },
    );
    const shown = shownFields(save.document);
    await Preset.update({ ...shown, headNumber: number, changedAt: now }, { where: { id }, transaction });
    if (shown.tagLines !== preset.tagLines)
      await replaceTags(dependencies, id, save.document.tags, transaction);
    const action = save.restoredFrom === undefined ? 'version saved' : 'version restored';
    await auditPreset(dependencies, transaction, person, action, preset, {
      version: number,
      ...(save.restoredFrom === undefined ? {} : { restoredFrom: save.restoredFrom }),
    });
  });
  return findPresetAndHead(dependencies, id);
}

/** A new version equal to an old one. */
export async function restoreVersion(
  dependencies: Dependencies,
  person: Person,
  id: string,
  number: number,
  { note, baseVersion }: { note: string; baseVersion: number },
): Promise<PresetAndVersion> {
  demand(person, 'restore', await findPreset(dependencies, id));
  const old = await findVersion(dependencies, id, number);
  return saveVersion(dependencies, person, id, {
    document: JSON.parse(old.document) as PresetDocument,
    note: note || `Restored from version ${number}`,
    baseVersion,
    restoredFrom: number,
  });
}

/** A copy of a version, private to the one who makes it; what they may not read is not in it. */
export async function copyDocument(
  dependencies: Dependencies,
  person: Person,
  { preset, version: source }: PresetAndVersion,
  title: string,
): Promise<PresetAndVersion> {
  const document = await readDocument(dependencies, person, preset, source);
  const named = { ...document, title: (title || `${document.title}, copy`).slice(0, LIMITS.titleLength) };
  const note = `Copied from “${document.title}”, version ${source.number}`.slice(0, LIMITS.noteLength);
  return createPreset(dependencies, person, { document: named, note, visibility: 'private', labId: null });
}

interface VisibilityChange {
  visibility: 'private' | 'lab';
  labId: string | null;
  from?: { visibility: 'private' | 'lab'; labId: string | null } | undefined;
}

/** Changes who sees a preset; refused when someone else changed that since the person looked. */
export async function changeVisibility(
  dependencies: Dependencies,
  person: Person,
  id: string,
  { visibility, labId, from }: VisibilityChange,
): Promise<PresetAndVersion> {
  await dependencies.database.change(async (transaction) => {
    const preset = await findPreset(dependencies, id, transaction);
    demand(person, 'change visibility', preset);
    if (from !== undefined && (from.visibility !== preset.visibility || from.labId !== preset.labId)) {
      throw new Refusal(
        409,
        'conflict',
        'Who sees this preset was changed meanwhile, so nothing was changed now. Look at it as it is, then decide again.',
      );
    }
    const placed = placement(person, visibility, labId);
    await dependencies.database.models.Preset.update(placed, { where: { id }, transaction });
    // A lab that loses the preset is told as well as one that gains it.
    for (const lab of new Set([preset.labId, placed.labId])) {
      const told = { id, title: preset.title, labId: lab };
      await auditPreset(dependencies, transaction, person, 'visibility changed', told, {
        to: placed.visibility,
      });
    }
  });
  return findPresetAndHead(dependencies, id);
}

/** Takes a preset out of sight for 30 days, in which it can be brought back. Its links stop working meanwhile. */
export async function deletePreset(dependencies: Dependencies, person: Person, id: string): Promise<void> {
  await dependencies.database.change(async (transaction) => {
    const preset = await findPreset(dependencies, id, transaction);
    demand(person, 'delete', preset);
    const { Preset } = dependencies.database.models;
    await Preset.update({ deletedAt: new Date() }, { where: { id }, transaction });
    await auditPreset(dependencies, transaction, person, 'preset deleted', preset);
  });
}
