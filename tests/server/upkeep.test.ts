import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

import { afterEach, beforeEach, expect, it } from 'vitest';

import type { DeletedPresetsBody } from '@/contract/deleted';
import type { PresetBody } from '@/contract/presets';

import { purgeDeleted } from '../../server/commands/deleted-presets';
import { Database } from '../../server/models/database';
import { backUp } from '../../server/upkeep/back-up';
import { restore } from '../../server/upkeep/restore';
import { sampleDocument, startTestServer, type TestServer, type Visitor } from '../support/test-server';

let server: TestServer;
let researcher: Visitor;
beforeEach(async () => {
  server = await startTestServer();
  researcher = await server.person('researcher');
});
afterEach(() => server.close());

const make = async (title: string) =>
  ((await researcher.post('/presets', { document: sampleDocument(title) })).body as PresetBody).preset.id;

it('brings a deleted preset back with its versions, and to its owner alone', async () => {
  const id = await make('Newts');
  await researcher.send('delete', `/presets/${id}`);
  const student = await server.person('student');
  expect((await student.post(`/presets/${id}/bring-back`)).status).toBe(404);
  const { items } = (await researcher.get('/presets/deleted')).body as DeletedPresetsBody;
  expect(items.map((one) => one.id)).toEqual([id]);
  expect(((await student.get('/presets/deleted')).body as DeletedPresetsBody).items).toEqual([]);
  expect((await researcher.post(`/presets/${id}/bring-back`)).status).toBe(204);
  expect((await researcher.get(`/presets/${id}`)).status).toBe(200);
});

it('deletes for good after 30 days and not before', async () => {
  const { Preset, PresetVersion } = server.database.models;
  const [young, old] = [await make('Young'), await make('Old')];
  const daysAgo = (days: number) => new Date(Date.now() - days * 24 * 60 * 60_000);
  await Preset.update({ deletedAt: daysAgo(29) }, { where: { id: young } });
  await Preset.update({ deletedAt: daysAgo(31) }, { where: { id: old } });
  const remove = 'DELETE FROM preset_versions WHERE presetId = ?';
  await expect(server.database.sequelize.query(remove, { replacements: [young] })).rejects.toMatchObject({
    parent: { message: expect.stringContaining('never deleted') as string },
  });
  expect((await researcher.post(`/presets/${old}/bring-back`)).status).toBe(404);
  expect(await purgeDeleted(server.database)).toBe(1);
  expect(await PresetVersion.count({ where: { presetId: old } })).toBe(0);
  expect(await Preset.findByPk(old)).toBeNull();
  expect(await PresetVersion.count({ where: { presetId: young } })).toBe(1);
});

it('backs up under writes; what was acknowledged before is in it, and it restores', async () => {
  const path = join(server.folder, 'moiety.sqlite');
  const target = join(server.folder, 'copy.sqlite');
  const before = await make('Before');
  const writes = Promise.all(Array.from({ length: 20 }, (_, k) => make(`During ${k}`)));
  await backUp(path, target);
  await writes;
  await expect(backUp(path, target)).rejects.toThrow('exists already');
  await expect(restore(path, target)).rejects.toThrow('The server is running');

  await server.database.close();
  const aside = await restore(path, target);
  expect(aside !== null && existsSync(aside)).toBe(true);
  const restored = new Database(path);
  expect(await restored.models.Preset.findByPk(before)).not.toBeNull();
  expect(await restored.sequelize.query('PRAGMA integrity_check')).toMatchObject([
    [{ integrity_check: 'ok' }],
    {},
  ]);
  await restored.close();
  server.database.close = () => Promise.resolve();
});

it('refuses a damaged backup and one of an unknown version, and changes nothing', async () => {
  const path = join(server.folder, 'moiety.sqlite');
  const damaged = join(server.folder, 'damaged.sqlite');
  writeFileSync(damaged, 'no database at all');
  await expect(restore(path, damaged)).rejects.toThrow('no sound backup');
  const newer = join(server.folder, 'newer.sqlite');
  await server.database.sequelize.query("INSERT INTO schema_migrations (name) VALUES ('999-later')");
  await backUp(path, newer);
  const kept = readFileSync(path);
  await expect(restore(path, newer)).rejects.toThrow('another version');
  expect(readFileSync(path).equals(kept)).toBe(true);
});
