import { roleMay, type Role } from '@/contract/rights';
import { STARTER_PRESETS } from '@/presets';

import { createPreset } from '../commands/preset-commands';
import type { Dependencies } from '../dependencies';
import { readPerson } from '../middleware/current-user';
import { seedDemoSweeps } from './demo-sweeps';

export interface DemoPerson {
  id: string;
  name: string;
  email: string;
  password: string;
  role: Role;
}

const PASSWORD = 'springtails by sex';
export const DEMO_LAB = { id: 'demo-lab', name: 'Fen Lab (invented)' };

/** Invented people; they can sign in only while DEMO=1. */
export const DEMO_PEOPLE: readonly DemoPerson[] = [
  {
    id: 'demo-supervisor',
    name: 'Ada Fennimore',
    email: 'supervisor@demo.invalid',
    password: PASSWORD,
    role: 'supervisor',
  },
  {
    id: 'demo-researcher',
    name: 'Rui Maddock',
    email: 'researcher@demo.invalid',
    password: PASSWORD,
    role: 'researcher',
  },
  {
    id: 'demo-student',
    name: 'Sanna Weldon',
    email: 'student@demo.invalid',
    password: PASSWORD,
    role: 'student',
  },
  {
    id: 'demo-collaborator',
    name: 'Colm Lichfield',
    email: 'collaborator@demo.invalid',
    password: PASSWORD,
    role: 'collaborator',
  },
];

const OPEN_TO_LAB = ['saturating-two-sex-predator', 'allee-under-harvest'] as const;

/** The demo lab, its people, two presets open to it and a sweep to work on; made once, kept afterwards. */
export async function seedDemo(dependencies: Dependencies): Promise<void> {
  await seedPeople(dependencies);
  await seedPresets(dependencies);
  const supervisor = await readPerson(dependencies, 'demo-supervisor');
  if (supervisor?.memberships.some(({ labId, role }) => labId === DEMO_LAB.id && roleMay(role, 'set sweeps')))
    await seedDemoSweeps(dependencies, supervisor, DEMO_LAB.id, 'demo-student');
}

async function seedPeople(dependencies: Dependencies): Promise<void> {
  const { database, passwords } = dependencies;
  const { User, Lab, Membership } = database.models;
  const now = new Date();
  const hashes = await Promise.all(DEMO_PEOPLE.map(({ password }) => passwords.hash(password)));
  await database.change(async (transaction) => {
    await Lab.upsert({ ...DEMO_LAB, createdAt: now }, { transaction });
    for (const [k, { id, name, email, role }] of DEMO_PEOPLE.entries()) {
      if (!(await User.findByPk(id, { transaction }))) {
        await User.create(
          { id, name, email, passwordHash: hashes[k] ?? '', demo: true, createdAt: now },
          { transaction },
        );
        await Membership.create({ userId: id, labId: DEMO_LAB.id, role }, { transaction });
      }
    }
  });
}

async function seedPresets(dependencies: Dependencies): Promise<void> {
  const { Preset } = dependencies.database.models;
  if ((await Preset.count({ where: { labId: DEMO_LAB.id } })) > 0) return;
  const researcher = await readPerson(dependencies, 'demo-researcher');
  if (researcher === null) return;
  for (const key of OPEN_TO_LAB) {
    const document = STARTER_PRESETS.find(({ id }) => id === key)?.document;
    if (!document) continue;
    await createPreset(dependencies, researcher, {
      document: { ...document, title: `${document.title} (lab copy)` },
      note: 'Begun from the starter',
      visibility: 'lab',
      labId: DEMO_LAB.id,
    });
  }
}
