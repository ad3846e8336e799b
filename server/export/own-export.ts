import type { Dependencies } from '../dependencies';
import type { Person } from '../middleware/current-user';
import { may } from '../policies/preset-policy';
import { presetEntries } from './preset-entries';
import { fileName, jsonEntry, type ArchiveEntry } from './zip-stream';

const README = `What is yours in Moiety, as of the day of this file.

account.json         name, address and labs
presets/             a folder each: preset.json with versions and links, every version as *.moiety.json
                     (which the workbench imports), and its comments
assigned-sweeps/     what was set for you: your work as last kept, and each hand-in with its receipt and,
                     where it was given back, its review
events.json          sign-ins and changes of the account

Links are listed without their addresses, and nothing in here opens anything. Known facts of presets that a sweep
was set from for you are left out until your work is judged.
`;

/** Everything that one person owns. */
export async function* ownEntries(dependencies: Dependencies, person: Person): AsyncGenerator<ArchiveEntry> {
  const { User, Preset, AssignedPerson, AssignedWork, HandIn, AuditEntry } = dependencies.database.models;
  yield { name: 'README.txt', text: README };
  const user = await User.findByPk(person.id);
  yield jsonEntry('account.json', {
    name: person.name,
    email: person.email,
    createdAt: user?.createdAt ?? null,
    labs: person.memberships.map(({ labName, role }) => ({ name: labName, role })),
  });
  const presets = await Preset.findAll({
    where: { ownerId: person.id, deletedAt: null },
    include: [{ association: 'owner' }, { association: 'lab' }],
    order: [['createdAt', 'ASC']],
  });
  for (const preset of presets)
    if (may(person, 'view', preset)) yield* presetEntries(dependencies, person, preset);

  const places = await AssignedPerson.findAll({
    where: { userId: person.id },
    include: [
      { association: 'assigned', attributes: ['id', 'title', 'brief', 'state', 'dueAt', 'timeZone'] },
    ],
  });
  for (const { assigned, state } of places) {
    if (!assigned || assigned.state === 'draft') continue;
    const where = { assignedId: assigned.id, userId: person.id };
    const folder = `assigned-sweeps/${fileName(assigned.title)}-${fileName(assigned.id)}`;
    const { title, brief, dueAt, timeZone } = assigned;
    yield jsonEntry(`${folder}/sweep.json`, {
      title,
      brief,
      dueAt,
      timeZone,
      state: assigned.state,
      mine: state,
    });
    const work = await AssignedWork.findOne({ where });
    if (work) yield { name: `${folder}/work.json`, text: `${work.content}\n` };
    const handIns = await HandIn.findAll({
      where,
      include: [{ association: 'review' }],
      order: [['number', 'ASC']],
    });
    for (const { number, code, late, handedInAt, frozen, review } of handIns)
      yield jsonEntry(`${folder}/hand-in-${number}.json`, {
        number,
        receipt: code,
        late,
        handedInAt,
        ...(JSON.parse(frozen) as object),
        review: review?.outcome
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
  const events = await AuditEntry.findAll({
    where: { labId: null, actorId: person.id },
    order: [['id', 'DESC']],
    limit: 10_000,
  });
  yield jsonEntry(
    'events.json',
    events.map(({ at, action, subject }) => ({ at, action, subject })),
  );
}
