import type { WorkState } from '@/contract/assigned-sweeps';
import { roleMay } from '@/contract/rights';

import type { Database } from '../../models/database';
import type { LoadPerson } from './people';
import type { LoadPreset } from './presets';
import type { Draw } from './random';
import { A_DAY, inSlices, LOAD_DAY, type LoadSizes } from './sizes';
import { doesSweeps, drawHandIn, drawSweep, type LoadSweep } from './sweeps';

/** One hand-in in ten is a second one. */
const FIRST_SHARE = 0.9;

function groupBy<One>(all: readonly One[], key: (one: One) => string | null): Map<string, One[]> {
  const groups = new Map<string, One[]>();
  for (const one of all) {
    const name = key(one);
    if (name === null) continue;
    const group = groups.get(name);
    if (group) group.push(one);
    else groups.set(name, [one]);
  }
  return groups;
}

/** Writes as many sweeps a lab as the hand-ins need, places for all who do them, hand-ins and reviews. */
export async function writeHandIns(
  database: Database,
  draw: Draw,
  people: readonly LoadPerson[],
  presets: readonly LoadPreset[],
  { handIns }: LoadSizes,
): Promise<number> {
  const firsts = Math.ceil(handIns * FIRST_SHARE);
  const each = Math.ceil(firsts / Math.max(1, people.filter(doesSweeps).length));
  const presetsOf = groupBy(presets, ({ labId }) => labId);
  let first = firsts;
  let second = handIns - firsts;
  let sweeps = 0;
  for (const [labId, members] of groupBy(people, (one) => one.labId)) {
    const supervisor = members.find(({ role }) => roleMay(role, 'set sweeps'));
    const open = presetsOf.get(labId) ?? [];
    if (supervisor === undefined || open.length === 0) continue;
    const places: { sweep: LoadSweep; person: LoadPerson; made: ReturnType<typeof drawHandIn>[] }[] = [];
    const here = Array.from({ length: each }, (_, k) => {
      const preset = open[k % open.length];
      if (preset === undefined) throw new Error('The lab has no preset to set a sweep from.');
      return drawSweep(draw, supervisor, preset, `${labId}-sweep-${k}`, k);
    });
    for (const sweep of here)
      for (const person of members.filter(doesSweeps)) {
        const made = first > 0 ? [drawHandIn(draw, sweep, person, 1)] : [];
        if (first > 0) first -= 1;
        if (second > 0 && made.length === 1) {
          made.push(drawHandIn(draw, sweep, person, 2));
          second -= 1;
        }
        places.push({ sweep, person, made });
      }
    sweeps += here.length;
    await writeLab(database, supervisor, here, places);
  }
  return sweeps;
}

async function writeLab(
  database: Database,
  supervisor: LoadPerson,
  sweeps: readonly LoadSweep[],
  places: readonly { sweep: LoadSweep; person: LoadPerson; made: ReturnType<typeof drawHandIn>[] }[],
): Promise<void> {
  const { AssignedSweep, AssignedPerson, HandIn, Review, AuditEntry } = database.models;
  const all = places.flatMap(({ made, sweep }) => made.map((one) => ({ ...one, sweep })));
  await database.change(async (transaction) => {
    const options = { transaction, validate: false };
    await AssignedSweep.bulkCreate([...sweeps], options);
    for (const slice of inSlices(places))
      await AssignedPerson.bulkCreate(
        slice.map(({ sweep, person, made }) => {
          const newest = made.at(-1);
          const state: WorkState = newest === undefined ? 'untouched' : (newest.outcome ?? 'sent');
          return {
            assignedId: sweep.id,
            userId: person.id,
            name: person.name,
            state,
            addedAt: sweep.createdAt,
          };
        }),
        options,
      );
    for (const slice of inSlices(all)) {
      await HandIn.bulkCreate(
        slice.map(({ handIn }) => handIn),
        options,
      );
      await Review.bulkCreate(
        slice.flatMap(({ handIn, outcome }) =>
          outcome === null
            ? []
            : [
                {
                  handInId: handIn.id,
                  revision: 1,
                  judgements: { point: outcome === 'agreed' ? ('agrees' as const) : ('differs' as const) },
                  remarks: [],
                  outcome,
                  note: 'Look at the end of the range again.',
                  byId: supervisor.id,
                  byName: supervisor.name,
                  at: new Date(LOAD_DAY - A_DAY),
                },
              ],
        ),
        options,
      );
      await AuditEntry.bulkCreate(
        slice.map(({ handIn, sweep }) => ({
          at: handIn.handedInAt,
          actorId: handIn.userId,
          actorName: handIn.name,
          action: 'handed in' as const,
          labId: supervisor.labId,
          subject: sweep.title,
          details: {
            sweep: sweep.id,
            handIn: handIn.id,
            number: handIn.number,
            receipt: handIn.code,
            late: 'no',
          },
        })),
        options,
      );
    }
  });
}
