import { roleMay } from '@/contract/rights';
import type { AuditAction } from '@/contract/audit';

import type { Database } from '../../models/database';
import { populationsOf } from '../../presenters/present-preset';
import { drawDocument, drawNextVersion } from './documents';
import type { LoadPerson } from './people';
import type { Draw } from './random';
import { A_DAY, inSlices, LOAD_DAY, type LoadSizes } from './sizes';

/** Presets written in one transaction. */
const BATCH = 500;
/** Of five presets so many are open to the lab. */
const OPEN_OF_FIVE = 3;

export interface LoadPreset {
  readonly id: string;
  readonly title: string;
  readonly owner: LoadPerson;
  readonly labId: string | null;
  readonly document: string;
}

function drawPreset(draw: Draw, owner: LoadPerson, k: number, turn: number, versions: number) {
  const id = `load-preset-${String(k).padStart(5, '0')}`;
  const open = turn % 5 < OPEN_OF_FIVE && roleMay(owner.role, 'create lab presets');
  const labId = open ? owner.labId : null;
  const createdAt = new Date(LOAD_DAY - (30 + draw() * 400) * A_DAY);
  let document = drawDocument(draw);
  const { title } = document;
  const rows = [];
  const history = [];
  for (let number = 1; number <= versions; number += 1) {
    if (number > 1) document = drawNextVersion(draw, document);
    const savedAt = new Date(createdAt.getTime() + (number - 1) * (1 + draw()) * A_DAY);
    const note = number === 1 ? '' : `Another value, the ${number}th`;
    rows.push({
      presetId: id,
      number,
      document: JSON.stringify(document),
      note,
      authorId: owner.id,
      savedAt,
    });
    const action: AuditAction = number === 1 ? 'preset created' : 'version saved';
    history.push({
      at: savedAt,
      actorId: owner.id,
      actorName: owner.name,
      action,
      labId,
      subject: title,
      details: { preset: id, version: number },
    });
  }
  const preset = {
    id,
    starterKey: null,
    ownerId: owner.id,
    labId,
    visibility: open ? ('lab' as const) : ('private' as const),
    title,
    summary: document.summary,
    tagLines: document.tags.join('\n'),
    populations: populationsOf(document),
    headNumber: versions,
    createdAt,
    changedAt: rows.at(-1)?.savedAt ?? createdAt,
  };
  const tags = document.tags.map((tag) => ({ presetId: id, tag }));
  return { preset, rows, history, tags, head: JSON.stringify(document), owner };
}

/** Writes presets with their versions, tags and history; returns what sweeps are set from. */
export async function writePresets(
  database: Database,
  draw: Draw,
  people: readonly LoadPerson[],
  { presets, versions }: LoadSizes,
): Promise<LoadPreset[]> {
  const { Preset, PresetVersion, PresetTag, AuditEntry } = database.models;
  const written: LoadPreset[] = [];
  for (let from = 0; from < presets; from += BATCH) {
    const drawn = Array.from({ length: Math.min(BATCH, presets - from) }, (_, k) => {
      const owner = people[(from + k) % people.length];
      if (owner === undefined) throw new Error('There is nobody to own a preset.');
      // Each owner has some of both kinds, whatever the number of people.
      const turn = from + k + Math.floor((from + k) / people.length);
      return drawPreset(draw, owner, from + k, turn, versions);
    });
    await database.change(async (transaction) => {
      const options = { transaction, validate: false };
      await Preset.bulkCreate(
        drawn.map(({ preset }) => preset),
        options,
      );
      for (const slice of inSlices(drawn.flatMap(({ rows }) => rows)))
        await PresetVersion.bulkCreate(slice, options);
      for (const slice of inSlices(drawn.flatMap(({ tags }) => tags)))
        await PresetTag.bulkCreate(slice, options);
      for (const slice of inSlices(drawn.flatMap(({ history }) => history)))
        await AuditEntry.bulkCreate(slice, options);
    });
    for (const { preset, head, owner } of drawn)
      written.push({ id: preset.id, title: preset.title, owner, labId: preset.labId, document: head });
  }
  return written;
}
