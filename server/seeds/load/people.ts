import type { Role } from '@/contract/rights';

import type { Database } from '../../models/database';
import { pick, type Draw } from './random';
import { A_DAY, inSlices, LOAD_DAY, type LoadSizes } from './sizes';

const FIRST = [
  'Ada',
  'Bram',
  'Cleo',
  'Dara',
  'Emre',
  'Fay',
  'Goran',
  'Hedda',
  'Ines',
  'Jory',
  'Kaja',
  'Leif',
];
const LAST = [
  'Alder',
  'Birch',
  'Carr',
  'Dune',
  'Eyot',
  'Fenn',
  'Gorse',
  'Heath',
  'Isle',
  'Knoll',
  'Lea',
  'Marsh',
];
const GROUPS = [
  'Wetland',
  'Heath',
  'Upland',
  'Estuary',
  'Island',
  'Forest',
  'River',
  'Meadow',
  'Dune',
  'Lake',
];

/** One lab in twenty is large: it draws as many people as ten others. */
const LARGE_EVERY = 20;
const LARGE = 10;

export interface LoadPerson {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  readonly labId: string;
  readonly role: Role;
}

const padded = (k: number) => String(k).padStart(4, '0');

function roleOf(place: number): Role {
  if (place === 0) return 'supervisor';
  if (place % 8 === 1 || place % 8 === 2) return 'researcher';
  return place % 8 === 7 ? 'collaborator' : 'student';
}

/** Everyone in one lab, each of which has a supervisor. */
export function drawPeople(draw: Draw, { labs, people }: LoadSizes): LoadPerson[] {
  const drawn = Array.from({ length: labs }, (_, lab) => lab);
  const turns = drawn.flatMap((lab) =>
    Array.from({ length: lab % LARGE_EVERY === 0 ? LARGE : 1 }, () => lab),
  );
  const placesTaken = drawn.map(() => 0);
  return Array.from({ length: people }, (_, k) => {
    const lab = k < labs ? k : (turns[(k - labs) % turns.length] ?? 0);
    const place = placesTaken[lab] ?? 0;
    placesTaken[lab] = place + 1;
    return {
      id: `load-person-${padded(k)}`,
      name: `${pick(draw, FIRST)} ${pick(draw, LAST)} ${k}`,
      email: `person-${k}@load.invalid`,
      labId: `load-lab-${padded(lab)}`,
      role: roleOf(place),
    };
  });
}

export async function writePeople(
  database: Database,
  people: readonly LoadPerson[],
  passwordHash: string,
): Promise<void> {
  const { User, Lab, Membership } = database.models;
  const createdAt = new Date(LOAD_DAY - 500 * A_DAY);
  const labs = [...new Set(people.map(({ labId }) => labId))];
  await database.change(async (transaction) => {
    await Lab.bulkCreate(
      labs.map((id, k) => ({ id, name: `${GROUPS[k % GROUPS.length]} group ${k}`, createdAt })),
      { transaction },
    );
    for (const slice of inSlices(people)) {
      await User.bulkCreate(
        slice.map(({ id, name, email }) => ({ id, name, email, passwordHash, createdAt })),
        { transaction },
      );
      await Membership.bulkCreate(
        slice.map(({ id, labId, role }) => ({ userId: id, labId, role, joinedAt: createdAt })),
        { transaction },
      );
    }
  });
}
