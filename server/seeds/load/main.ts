import { mkdirSync } from 'node:fs';
import { join } from 'node:path';

import { readEnvironment } from '../../env';
import { createMigrator } from '../../migrations';
import { Database } from '../../models/database';
import { Passwords } from '../../passwords';
import { seedStarters } from '../starters';
import { LOAD_PASSWORD, seedLoad } from './seed-load';
import { FULL_LOAD } from './sizes';

const SEED = 4;

/** Fills the empty data folder of DATA_DIR for measurements. */
async function run(): Promise<void> {
  const { dataFolder } = readEnvironment(process.env);
  mkdirSync(dataFolder, { recursive: true, mode: 0o700 });
  const database = new Database(join(dataFolder, 'moiety.sqlite'));
  const began = performance.now();
  const tell = (words: string) =>
    void process.stdout.write(`${words}, after ${((performance.now() - began) / 1000).toFixed(1)} s\n`);
  try {
    await createMigrator(database).up();
    await seedStarters(database);
    await seedLoad(database, new Passwords(), FULL_LOAD, { seed: SEED, tell });
  } finally {
    await database.close();
  }
  process.stdout.write(`Everyone signs in as person-0@load.invalid and so on with “${LOAD_PASSWORD}”.\n`);
}

try {
  await run();
} catch (error) {
  process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
  process.exitCode = 1;
}
