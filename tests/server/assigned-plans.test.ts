import { QueryTypes } from 'sequelize';
import { afterEach, beforeEach, expect, it } from 'vitest';

import type { Receipt } from '@/contract/assigned-sweeps';
import type { PresetBody } from '@/contract/presets';

import { DEMO_LAB } from '../../server/seeds/demo';
import { documentWithAnswer, handInBody, openSweep } from '../support/assigned';
import { startTestServer, type TestServer } from '../support/test-server';

let server: TestServer;
beforeEach(async () => {
  server = await startTestServer();
});
afterEach(() => server.close());

it('reads lists, tasks, tables and hand-ins by indices alone', async () => {
  const supervisor = await server.person('supervisor');
  const student = await server.person('student');
  const document = documentWithAnswer();
  const placed = { document, visibility: 'lab', labId: DEMO_LAB.id };
  const { preset } = (await supervisor.post('/presets', placed)).body as PresetBody;
  const { id } = await openSweep(supervisor, preset.id, ['demo-student']);
  const receipt = (await student.post(`/assigned/${id}/hand-ins`, handInBody())).body as Receipt;
  await server.mailArrived();

  const { sequelize } = server.database;
  const statements = new Set<string>();
  const { options } = sequelize as unknown as { options: { logging: ((line: string) => void) | false } };
  options.logging = (line) => statements.add(line.replace(/^Executing \(.*?\): /, ''));
  for (const [visitor, path] of [
    [student, '/assigned'],
    [student, `/labs/${DEMO_LAB.id}/assigned?state=open`],
    [student, `/assigned/${id}/task`],
    [student, `/presets/${preset.id}`],
    [supervisor, `/labs/${DEMO_LAB.id}/assigned`],
    [supervisor, `/labs/${DEMO_LAB.id}/assigned?state=open`],
    [supervisor, `/assigned/${id}`],
    [supervisor, `/assigned/${id}/table`],
    [supervisor, `/hand-ins/${receipt.id}`],
  ] as const)
    expect((await visitor.get(path)).status).toBe(200);
  options.logging = false;

  const ours = [...statements].filter((one) => one.startsWith('SELECT') && /assigned_|hand_ins/.test(one));
  expect(ours.length).toBeGreaterThan(10);
  for (const statement of ours) {
    const plan = await sequelize.query<{ detail: string }>(`EXPLAIN QUERY PLAN ${statement}`, {
      type: QueryTypes.SELECT,
    });
    const scans = plan.filter(({ detail }) => /^SCAN /.test(detail)).map(({ detail }) => detail);
    expect([statement, scans]).toEqual([statement, []]);
  }
});
