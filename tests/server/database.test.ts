import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

import { afterEach, beforeEach, expect, it } from 'vitest';

import { createMigrator } from '../../server/migrations';
import { Database } from '../../server/models/database';

let folder: string;
let database: Database;
beforeEach(async () => {
  folder = mkdtempSync(join(tmpdir(), 'moiety-database-'));
  database = new Database(join(folder, 'moiety.sqlite'));
  await createMigrator(database).up();
});
afterEach(async () => {
  await database.close();
  rmSync(folder, { recursive: true, force: true });
});

const makeLab = (id: string) =>
  database.change((transaction) =>
    database.models.Lab.create({ id, name: id, createdAt: new Date() }, { transaction }),
  );
const labs = async () =>
  (await database.read<{ id: string }>('SELECT id FROM labs ORDER BY id', {})).map(({ id }) => id);

it('reads what was committed at once, and within a change what the change has done so far', async () => {
  await makeLab('a');
  expect(await labs()).toEqual(['a']);
  await database.change(async (transaction) => {
    await database.models.Lab.create({ id: 'b', name: 'b', createdAt: new Date() }, { transaction });
    const text = 'SELECT id FROM labs WHERE id = $id';
    expect(await database.read(text, { id: 'b' }, transaction)).toEqual([{ id: 'b' }]);
    expect(await database.read(text, { id: 'b' })).toEqual([]);
  });
  expect(await labs()).toEqual(['a', 'b']);
});

it('takes nothing of a change that failed into the next', async () => {
  for (let k = 0; k < 3; k += 1) {
    const failing = database.change(async (transaction) => {
      await database.models.Lab.create({ id: 'lost', name: '', createdAt: new Date() }, { transaction });
      throw new Error('refused');
    });
    await expect(failing).rejects.toThrow('refused');
    await makeLab(`kept ${k}`);
  }
  expect(await labs()).toEqual(['kept 0', 'kept 1', 'kept 2']);
});

it('keeps changes apart that are handed in at the same time, some of which fail', async () => {
  const outcomes = await Promise.allSettled(
    Array.from({ length: 20 }, (_, k) =>
      database.change(async (transaction) => {
        await database.models.Lab.create({ id: `${k}`, name: '', createdAt: new Date() }, { transaction });
        if (k % 3 === 0) throw new Error('refused');
      }),
    ),
  );
  const done = outcomes.flatMap(({ status }, k) => (status === 'fulfilled' ? [`${k}`] : []));
  expect(done).toHaveLength(13);
  expect(await labs()).toEqual([...done].sort());
});

it('refuses to change anything by reading', async () => {
  await makeLab('a');
  await expect(database.read("UPDATE labs SET name = 'x'", {})).rejects.toThrow('readonly');
  expect(await database.read('SELECT name FROM labs', {})).toEqual([{ name: 'a' }]);
});

it('says what is wrong with a text that cannot be read, each time', async () => {
  for (let k = 0; k < 3; k += 1)
    await expect(database.read('SELECT missing FROM labs', {})).rejects.toThrow('no such column');
  await expect(database.read('SELECT id FROM labs', { unknown: 1 })).rejects.toThrow();
  expect(await labs()).toEqual([]);
});
