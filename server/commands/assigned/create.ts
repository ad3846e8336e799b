import { SPREAD_KEY } from '@/engine/schema/symbols';
import type { PresetDocument } from '@/engine/schema/preset';
import type { SweepRange } from '@/contract/kept-sweep';

import { recordAudit } from '../../audit/record-audit';
import type { Dependencies } from '../../dependencies';
import { makeId } from '../../ids';
import { readMailSettings } from '../../mail/mail-settings';
import type { Person } from '../../middleware/current-user';
import type { AssignedSweep } from '../../models/assigned-sweep';
import { demandInLab } from '../../policies/lab-policy';
import { demand } from '../../policies/preset-policy';
import { findPreset, findVersion } from '../find-preset';
import { demandRevision, findForLab } from './find';

/** The first sweep of the document, else its first parameter, else the spread. */
function firstRange(document: PresetDocument): SweepRange {
  const [sweep] = document.sweeps;
  if (sweep && sweep.from !== sweep.to) {
    const { parameter, from, to } = sweep;
    return { parameter, from: Math.min(from, to), to: Math.max(from, to) };
  }
  const [first] = document.parameters;
  return first
    ? { parameter: first.symbol, from: first.min, to: first.max }
    : { parameter: SPREAD_KEY, from: 0, to: 1.5 };
}

/** A draft from a version of a preset. */
export async function createAssigned(
  dependencies: Dependencies,
  person: Person,
  labId: string,
  { presetId, version: number }: { presetId: string; version: number },
): Promise<string> {
  demandInLab(person, 'set sweeps', labId);
  const { database } = dependencies;
  const preset = await findPreset(dependencies, presetId);
  demand(person, 'view', preset);
  const version = await findVersion(dependencies, presetId, number);
  const document = JSON.parse(version.document) as PresetDocument;
  const id = makeId();
  await database.change(async (transaction) => {
    const { timeZone } = await readMailSettings(database, person.email, transaction);
    await database.models.AssignedSweep.create(
      {
        id,
        revision: 1,
        labId,
        state: 'draft',
        setById: person.id,
        setByName: person.name,
        presetId,
        presetTitle: document.title,
        presetVersion: number,
        document: version.document,
        title: document.title,
        brief: '',
        range: firstRange(document),
        freedom: { parameters: [], range: false, model: false },
        wanted: [],
        reference: { findings: [], sweep: null },
        dueAt: null,
        timeZone,
        createdAt: new Date(),
      },
      { transaction },
    );
    await recordAudit(database, transaction, {
      actor: person,
      action: 'sweep drafted',
      labId,
      subject: document.title,
      details: { sweep: id, preset: presetId, version: number },
    });
  });
  return id;
}

/** The same work once more, for other people: a draft without people and date. */
export async function setAgain(
  dependencies: Dependencies,
  person: Person,
  id: string,
  baseRevision: number,
): Promise<string> {
  const { database } = dependencies;
  const copyId = makeId();
  await database.change(async (transaction) => {
    const source: AssignedSweep = await findForLab(dependencies, person, id, 'set sweeps', transaction);
    demandRevision(source, baseRevision);
    const { labId, presetId, presetTitle, presetVersion, document, title, brief } = source;
    const { range, freedom, wanted, reference, timeZone } = source;
    await database.models.AssignedSweep.create(
      {
        ...{ labId, presetId, presetTitle, presetVersion, document, title, brief },
        ...{ range, freedom, wanted, reference, timeZone },
        id: copyId,
        revision: 1,
        state: 'draft',
        setById: person.id,
        setByName: person.name,
        dueAt: null,
        createdAt: new Date(),
      },
      { transaction },
    );
    await recordAudit(database, transaction, {
      actor: person,
      action: 'sweep set again',
      labId,
      subject: title,
      details: { sweep: copyId, again: id },
    });
  });
  return copyId;
}
