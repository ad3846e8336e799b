import { QueryTypes } from 'sequelize';
import { afterEach, beforeEach, expect, it } from 'vitest';

import type { PresetBody } from '@/contract/presets';

import { createMigrator, MIGRATIONS } from '../../server/migrations';
import { DEMO_LAB } from '../../server/seeds/demo';
import { handInBody, openSweep } from '../support/assigned';
import { sampleDocument, startTestServer, type TestServer } from '../support/test-server';

let server: TestServer;
beforeEach(async () => {
  server = await startTestServer();
  const supervisor = await server.person('supervisor');
  const student = await server.person('student');
  const placed = { document: sampleDocument(), visibility: 'lab', labId: DEMO_LAB.id };
  const { preset } = (await supervisor.post('/presets', placed)).body as PresetBody;
  await supervisor.post(`/presets/${preset.id}/links`, { label: 'for a colleague' });
  await supervisor.post(`/presets/${preset.id}/comments`, { text: 'Is this the right rate?' });
  await supervisor.post(`/labs/${DEMO_LAB.id}/invitations`, {
    invitations: [{ email: 'someone@example.org', role: 'student' }],
  });
  const { id } = await openSweep(supervisor, preset.id, ['demo-student']);
  await student.post(`/assigned/${id}/hand-ins`, handInBody());
  await server.mailArrived();
});
afterEach(() => server.close());

const select = <Row extends object>(statement: string) =>
  server.database.sequelize.query<Row>(statement, { type: QueryTypes.SELECT });

async function tables(): Promise<string[]> {
  const rows = await select<{ name: string }>(
    "SELECT name FROM sqlite_master WHERE type = 'table' AND name NOT LIKE 'sqlite%' AND name <> 'schema_migrations' ORDER BY name",
  );
  return rows.map(({ name }) => name);
}

async function lines(): Promise<Record<string, number>> {
  const counts: Record<string, number> = {};
  for (const table of await tables())
    counts[table] = (await select<{ n: number }>(`SELECT COUNT(*) AS n FROM "${table}"`))[0]?.n ?? -1;
  return counts;
}

/** Everything that the schema holds, as it was written. */
const schema = () =>
  select<{ name: string; sql: string | null }>(
    "SELECT type, name, sql FROM sqlite_master WHERE name NOT LIKE 'sqlite%' ORDER BY type, name",
  );

async function expectSound(): Promise<void> {
  expect(await select('PRAGMA integrity_check')).toEqual([{ integrity_check: 'ok' }]);
  expect(await select('PRAGMA foreign_key_check')).toEqual([]);
}

it('each step of a filled database goes back and forward again, and leaves what is older as it was', async () => {
  const migrator = createMigrator(server.database);
  const whole = await schema();
  const filled = await lines();
  for (const table of ['presets', 'preset_words', 'comments', 'hand_ins', 'invitations', 'mail_messages'])
    expect([table, filled[table] ?? 0]).not.toEqual([table, 0]);
  for (const { name } of [...MIGRATIONS].reverse()) {
    const before = await lines();
    await migrator.down({ to: name });
    await expectSound();
    const after = await lines();
    expect(await migrator.executed().then((steps) => steps.map((step) => step.name))).not.toContain(name);
    for (const [table, count] of Object.entries(after))
      expect([name, table, count]).toEqual([name, table, before[table]]);
    // Forward and back once more: a step is undone completely.
    await migrator.up({ to: name });
    await expectSound();
    await migrator.down({ to: name });
  }
  expect(await tables()).toEqual([]);
  await migrator.up();
  await expectSound();
  const again = new Map((await schema()).map(({ name, sql }) => [name, sql]));
  for (const { name, sql } of whole) expect([name, again.get(name)]).toEqual([name, sql]);
  expect(again.size).toBe(whole.length);
});

it('names its steps in order and once', () => {
  const names = MIGRATIONS.map(({ name }) => name);
  expect(names).toEqual([...new Set(names)].sort());
  names.forEach((name, k) => expect(name.startsWith(String(k + 1).padStart(3, '0'))).toBe(true));
});
