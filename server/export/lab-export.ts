import { auditQuerySchema } from '@/contract/audit';

import { auditAsCsv } from '../audit/list-audit';
import type { Dependencies } from '../dependencies';
import type { Person } from '../middleware/current-user';
import { presetEntries } from './preset-entries';
import { fileName, jsonEntry, type ArchiveEntry } from './zip-stream';

const README = `What is a lab's in Moiety, as of the day of this file.

lab.json             name and members with their roles
presets/             a folder each: preset.json with versions and links, every version as *.moiety.json
                     (which the workbench imports), and its comments
assigned-sweeps/     what was set, with its reference; where people stand; each hand-in with its review
history.csv          who did what, newest first

Addresses of members and of whom the lab invited, and what opens links, are not in it. It holds other people's work: keep it as you keep the
lab itself.
`;

/** Everything that a lab owns, for those who may export it. */
export async function* labEntries(
  dependencies: Dependencies,
  person: Person,
  labId: string,
): AsyncGenerator<ArchiveEntry> {
  const { database } = dependencies;
  const { Lab, Membership, Preset, AssignedSweep, AssignedPerson, HandIn } = database.models;
  yield { name: 'README.txt', text: README };
  const lab = await Lab.findByPk(labId);
  const members = await Membership.findAll({ where: { labId }, include: [{ association: 'user' }] });
  yield jsonEntry('lab.json', {
    name: lab?.name ?? '',
    createdAt: lab?.createdAt ?? null,
    members: members.map(({ user, role, joinedAt }) => ({ name: user?.name ?? '', role, joinedAt })),
  });
  const presets = await Preset.findAll({
    where: { labId, visibility: 'lab', deletedAt: null },
    include: [{ association: 'owner' }, { association: 'lab' }],
    order: [['createdAt', 'ASC']],
  });
  for (const preset of presets) yield* presetEntries(dependencies, person, preset);

  const sweeps = await AssignedSweep.findAll({ where: { labId }, order: [['createdAt', 'ASC']] });
  for (const sweep of sweeps) {
    const folder = `assigned-sweeps/${fileName(sweep.title)}-${fileName(sweep.id)}`;
    const people = await AssignedPerson.findAll({ where: { assignedId: sweep.id } });
    const { title, brief, state, range, freedom, wanted, reference, dueAt, timeZone } = sweep;
    const { setByName, presetTitle, presetVersion, openedAt, closedAt } = sweep;
    yield jsonEntry(`${folder}/sweep.json`, {
      ...{ title, brief, state, setBy: setByName, range, freedom, wanted, reference },
      ...{ dueAt, timeZone, openedAt, closedAt, preset: presetTitle, presetVersion },
      document: JSON.parse(sweep.document) as unknown,
      people: people.map((one) => ({ name: one.name, state: one.state })),
    });
    const handIns = await HandIn.findAll({
      where: { assignedId: sweep.id },
      attributes: ['id'],
      order: [['handedInAt', 'ASC']],
    });
    for (const { id } of handIns) {
      const handIn = await HandIn.findOne({ where: { id }, include: [{ association: 'review' }] });
      if (handIn === null) continue;
      const { name, number, code, late, handedInAt, frozen, review } = handIn;
      yield jsonEntry(`${folder}/${fileName(name)}-${fileName(handIn.userId)}-hand-in-${number}.json`, {
        ...{ name, number, receipt: code, late, handedInAt },
        ...(JSON.parse(frozen) as object),
        review: review
          ? {
              outcome: review.outcome,
              by: review.byName,
              note: review.note,
              judgements: review.judgements,
              remarks: review.remarks,
            }
          : null,
      });
    }
  }
  const history = await auditAsCsv(database, labId, auditQuerySchema.parse({}), { addresses: false });
  yield { name: 'history.csv', text: history };
}
