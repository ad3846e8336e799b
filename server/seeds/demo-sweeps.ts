import type { Reference, WantedFinding } from '@/contract/assigned-sweeps';

import { recordAudit } from '../audit/record-audit';
import { createAssigned } from '../commands/assigned/create';
import { changeAssigned } from '../commands/assigned/change';
import type { Dependencies } from '../dependencies';
import type { Person } from '../middleware/current-user';

const A_WEEK = 7 * 24 * 60 * 60_000;

const BRIEF = `The sturgeon of this invented river spawn only where they meet. Without boats their density follows

$$\\frac{dx}{dt} = r x \\left(1 - \\frac{x}{K}\\right)\\left(\\frac{x}{A} - 1\\right),$$

and a fleet with effort $E$ takes $q E x$ of them. Sweep the effort from none to $8$ per year.

1. Find the effort at which the stock is lost, and pin it.
2. Give the density of the stock right there.
3. Say what easing off a little brings back afterwards, and why.`;

const WANTED: WantedFinding[] = [
  {
    id: 'loss',
    label: 'Effort at which the stock is lost',
    kind: 'special point',
    point: 'fold',
    of: 'split',
    tolerance: { kind: 'absolute', amount: 0.01 },
  },
  {
    id: 'density',
    label: 'Density of the stock there',
    kind: 'number',
    unit: 'per km',
    tolerance: { kind: 'relative', amount: 0.02 },
  },
  { id: 'return', label: 'What easing off brings back', kind: 'reading' },
];

/** The engine's own sweep, which agrees with r (K - A)^2 / (4 A K q) = 4.8 and (K + A) / 2 = 12. */
const REFERENCE: Reference = {
  findings: [
    { id: 'loss', value: 4.8, text: '', confirmed: true },
    { id: 'density', value: 12, text: '', confirmed: true },
    {
      id: 'return',
      value: null,
      text: 'Nothing: the empty river attracts at every effort, so a lost stock stays lost.',
      confirmed: true,
    },
  ],
  sweep: null,
};

/** One sweep that is open for the student and one draft, made when the demo lab has none. */
export async function seedDemoSweeps(
  dependencies: Dependencies,
  supervisor: Person,
  labId: string,
  studentId: string,
): Promise<void> {
  const { database } = dependencies;
  const { AssignedSweep, Preset } = database.models;
  if ((await AssignedSweep.count({ where: { labId } })) > 0) return;
  const presets = await Preset.findAll({ where: { labId, deletedAt: null }, attributes: ['id', 'title'] });
  const sturgeon = presets.find(({ title }) => title.startsWith('Sturgeon'));
  const other = presets.find((one) => one !== sturgeon);
  if (sturgeon === undefined || other === undefined) return;
  await createAssigned(dependencies, supervisor, labId, { presetId: other.id, version: 1 });
  const id = await createAssigned(dependencies, supervisor, labId, { presetId: sturgeon.id, version: 1 });
  const title = 'The effort that loses the sturgeon';
  await changeAssigned(dependencies, supervisor, id, {
    baseRevision: 1,
    title,
    brief: BRIEF,
    range: { parameter: 'E', from: 0, to: 8 },
    freedom: { parameters: ['q'], range: false, model: false },
    wanted: WANTED,
    reference: REFERENCE,
    dueAt: new Date(Date.now() + A_WEEK).toISOString(),
    timeZone: 'Europe/London',
    people: [studentId],
  });
  // Opened without mail: nobody waits for any at the first start of a demo.
  await database.change(async (transaction) => {
    await AssignedSweep.update(
      { state: 'open', openedAt: new Date(), revision: 3 },
      { where: { id }, transaction },
    );
    await recordAudit(database, transaction, {
      actor: supervisor,
      action: 'sweep opened',
      labId,
      subject: title,
      details: { sweep: id, people: 1 },
    });
  });
}
