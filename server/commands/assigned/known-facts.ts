import type { Transaction } from 'sequelize';

import { roleMay } from '@/contract/rights';
import type { PresetDocument } from '@/engine/schema/preset';

import type { Dependencies } from '../../dependencies';
import type { Person } from '../../middleware/current-user';
import type { Preset } from '../../models/preset';
import type { PresetVersion } from '../../models/preset-version';

type Fact = PresetDocument['knownFacts'][number];
type Source = Pick<Preset, 'id' | 'ownerId'>;

const JUDGED = `'agreed', 'differs'`;
const everyFact = () => true;

/**
 * Which known facts of a preset a person may read. Those of a preset from which a sweep was set for them stay
 * hidden until their work is judged, and so do equal facts in its copies; owners and those who set sweeps in that
 * lab know them anyway.
 */
async function readableFacts(
  { database }: Dependencies,
  person: Person | null,
  preset: Source,
  transaction?: Transaction,
): Promise<(fact: Fact) => boolean> {
  if (person === null || preset.ownerId === person.id) return everyFact;
  const set = await database.read<{ labId: string; presetId: string; document: string }>(
    `SELECT a.labId, a.presetId, a.document FROM assigned_people p CROSS JOIN assigned_sweeps a ON a.id = p.assignedId
     WHERE p.userId = $me AND p.state NOT IN (${JUDGED}) AND a.state <> 'draft'`,
    { me: person.id },
    transaction,
  );
  const sets = (labId: string) =>
    person.memberships.some((one) => one.labId === labId && roleMay(one.role, 'set sweeps'));
  const unjudged = set.filter(({ labId }) => !sets(labId));
  if (unjudged.length === 0) return everyFact;
  if (unjudged.some(({ presetId }) => presetId === preset.id)) return () => false;
  const hidden = new Set(
    unjudged.flatMap(({ document }) =>
      (JSON.parse(document) as PresetDocument).knownFacts.map((fact) => JSON.stringify(fact)),
    ),
  );
  return (fact) => !hidden.has(JSON.stringify(fact));
}

/** The document of a version as a person may read it. */
export async function readDocument(
  dependencies: Dependencies,
  person: Person | null,
  preset: Source,
  version: Pick<PresetVersion, 'document'>,
): Promise<PresetDocument> {
  const document = JSON.parse(version.document) as PresetDocument;
  if (document.knownFacts.length === 0) return document;
  const readable = await readableFacts(dependencies, person, preset);
  return { ...document, knownFacts: document.knownFacts.filter(readable) };
}

/** What a person saves over a document, with the facts that were hidden from them put back. */
export async function withHiddenFacts(
  dependencies: Dependencies,
  transaction: Transaction,
  person: Person,
  preset: Source,
  { readHead, next }: { readHead: () => Promise<Pick<PresetVersion, 'document'>>; next: PresetDocument },
): Promise<PresetDocument> {
  const readable = await readableFacts(dependencies, person, preset, transaction);
  if (readable === everyFact) return next;
  const { knownFacts } = JSON.parse((await readHead()).document) as PresetDocument;
  const given = new Set(next.knownFacts.map((fact) => JSON.stringify(fact)));
  const hidden = knownFacts.filter((fact) => !readable(fact) && !given.has(JSON.stringify(fact)));
  return hidden.length === 0 ? next : { ...next, knownFacts: [...next.knownFacts, ...hidden] };
}
