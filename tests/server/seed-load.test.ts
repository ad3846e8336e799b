import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

import { afterEach, beforeEach, expect, it } from 'vitest';

import { presetSchema } from '@/engine/schema/preset';
import { handInSchema } from '@/contract/assigned-sweeps';

import { checkDocument } from '../../server/commands/check-document';
import { createMigrator } from '../../server/migrations';
import { Database } from '../../server/models/database';
import { Passwords } from '../../server/passwords';
import { seedLoad } from '../../server/seeds/load/seed-load';

const SIZES = { labs: 3, people: 24, presets: 60, versions: 3, handIns: 40 };
const CHEAP = { memoryCost: 64, timeCost: 1, parallelism: 1 };

let folder: string;
const opened: Database[] = [];
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'moiety-load-'));
});
afterEach(async () => {
  for (const database of opened.splice(0)) await database.close();
  rmSync(folder, { recursive: true, force: true });
});

async function write(name: string, seed: number): Promise<Database> {
  const database = new Database(join(folder, name));
  opened.push(database);
  await createMigrator(database).up();
  await seedLoad(database, new Passwords(CHEAP), SIZES, { seed, tell: () => undefined });
  return database;
}

it('writes what was asked for, of documents and hand-ins that the product itself accepts', async () => {
  const { models } = await write('one.sqlite', 1);
  expect(await models.Lab.count()).toBe(SIZES.labs);
  expect(await models.User.count()).toBe(SIZES.people);
  expect(await models.Preset.count()).toBe(SIZES.presets);
  expect(await models.HandIn.count()).toBe(SIZES.handIns);
  const versions = await models.PresetVersion.findAll();
  expect(versions.length).toBe(SIZES.presets * SIZES.versions);
  for (const { document } of versions) checkDocument(presetSchema.parse(JSON.parse(document)));
  for (const { frozen } of await models.HandIn.findAll())
    handInSchema.omit({ key: true }).parse(JSON.parse(frozen));
  const supervisors = await models.Membership.findAll({ where: { role: 'supervisor' } });
  expect(new Set(supervisors.map(({ labId }) => labId)).size).toBe(SIZES.labs);
});

it('writes the same for the same seed and other things for another', async () => {
  const titles = async (database: Database) =>
    (await database.models.Preset.findAll({ order: ['id'] })).map(({ title, tagLines }) => title + tagLines);
  const first = await titles(await write('one.sqlite', 1));
  expect(await titles(await write('two.sqlite', 1))).toEqual(first);
  expect(await titles(await write('three.sqlite', 2))).not.toEqual(first);
});

it('writes nothing where there are accounts', async () => {
  const database = await write('one.sqlite', 1);
  await expect(
    seedLoad(database, new Passwords(CHEAP), SIZES, { seed: 2, tell: () => undefined }),
  ).rejects.toThrow('holds accounts already');
  expect(await database.models.User.count()).toBe(SIZES.people);
});
