import type { Database } from '../../models/database';
import type { Passwords } from '../../passwords';
import { writeHandIns } from './hand-ins';
import { drawPeople, writePeople } from './people';
import { writePresets } from './presets';
import { drawFrom } from './random';
import type { LoadSizes } from './sizes';

/** Of every invented person: for measuring on one's own machine, and for nothing else. */
export const LOAD_PASSWORD = 'reeds in the wind';

/** Writes invented labs, people, presets and hand-ins into a database without accounts; the same for the same seed. */
export async function seedLoad(
  database: Database,
  passwords: Passwords,
  sizes: LoadSizes,
  { seed, tell }: { seed: number; tell: (words: string) => void },
): Promise<void> {
  if ((await database.models.User.count()) > 0)
    throw new Error(
      'This data folder holds accounts already. Name an empty one in DATA_DIR; nothing was written.',
    );
  const draw = drawFrom(seed);
  const people = drawPeople(draw, sizes);
  await writePeople(database, people, await passwords.hash(LOAD_PASSWORD));
  tell(`${sizes.labs} labs, ${sizes.people} people`);
  const presets = await writePresets(database, draw, people, sizes);
  tell(`${sizes.presets} presets with ${sizes.versions} versions each`);
  const sweeps = await writeHandIns(database, draw, people, presets, sizes);
  tell(`${sweeps} assigned sweeps with ${sizes.handIns} hand-ins`);
}
