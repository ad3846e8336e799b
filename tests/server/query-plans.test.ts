import { QueryTypes } from 'sequelize';
import { afterEach, beforeEach, expect, it } from 'vitest';

import type { Receipt } from '@/contract/assigned-sweeps';
import type { PresetBody } from '@/contract/presets';

import { DEMO_LAB } from '../../server/seeds/demo';
import { documentWithAnswer, handInBody, openSweep, workBody } from '../support/assigned';
import { sampleDocument, startTestServer, type TestServer, type Visitor } from '../support/test-server';

/** What may be read from end to end, and why that stays short. */
const BOUNDED = [
  // Parts of one statement: what its own indices found before.
  /^SCAN (seen|found|page|shown|s|f|o)$/,
  /^SCAN (\(subquery-\d+\)|\d+ CONSTANT ROWS?|CONSTANT ROW)$/,
  // The labs of the person, handed in with the request.
  /^SCAN json_each VIRTUAL TABLE/,
  // M stands for MATCH: the index of the search itself.
  /^SCAN (w|preset_words) VIRTUAL TABLE INDEX \d+:\S*M/,
  // The first entry of an index in its order, and no further.
  /^SCAN MailMessage USING COVERING INDEX mail_messages_due$/,
  // As many as the product ships.
  /^SCAN presets USING INDEX presets_starters$/,
];

let server: TestServer;
beforeEach(async () => {
  server = await startTestServer();
});
afterEach(() => server.close());

/** Everything that lists, searches, saves and reviews: what must be quick however full the file is. */
async function walk(supervisor: Visitor, student: Visitor): Promise<void> {
  const good = async (answer: Promise<{ status: number; body: unknown }>) => {
    const { status, body } = await answer;
    if (status >= 300) throw new Error(`${status} ${JSON.stringify(body)}`);
    return body;
  };
  const placed = { document: documentWithAnswer(), visibility: 'lab', labId: DEMO_LAB.id };
  const { preset } = (await good(supervisor.post('/presets', placed))) as PresetBody;
  const on = `/presets/${preset.id}`;
  const inLab = `/labs/${DEMO_LAB.id}`;
  await good(
    supervisor.post(`${on}/versions`, { document: sampleDocument('Newts again'), note: '', baseVersion: 1 }),
  );
  await good(supervisor.post(`${on}/versions/1/restore`, { note: '', baseVersion: 2 }));
  await good(supervisor.post(`${on}/links`, { label: 'for a colleague' }));
  await good(supervisor.post(`${on}/comments`, { text: 'Is this the right rate?' }));
  const sweep = await openSweep(supervisor, preset.id, ['demo-student']);
  const assigned = `/assigned/${sweep.id}`;
  await good(student.send('put', `${assigned}/work`, workBody()));
  const receipt = (await good(student.post(`${assigned}/hand-ins`, handInBody()))) as Receipt;
  const filters = ['', '?search=newts', '?search=newts%20pond&tag=pond', '?owner=me&sort=title', '?kind=own'];
  const more = ['?kind=lab&sort=owner', '?kind=starter&sort=created&order=ascending'];
  for (const visitor of [supervisor, student]) {
    for (const filter of [...filters, ...more]) await good(visitor.get(`/presets${filter}`));
    for (const path of [
      '/presets/choices',
      '/presets/deleted',
      on,
      `${on}/versions`,
      `${on}/activity`,
      `${on}/comments`,
    ])
      await good(visitor.get(path));
    for (const path of ['', '/assigned', '/assigned?state=open']) await good(visitor.get(`${inLab}${path}`));
    for (const path of ['/assigned', '/account/audit', '/account/sessions', '/account/mail', '/session'])
      await good(visitor.get(path));
  }
  await good(student.get(`${assigned}/task`));
  for (const path of [assigned, `${assigned}/table`, `${assigned}/table.csv`, `/hand-ins/${receipt.id}`])
    await good(supervisor.get(path));
  for (const filter of [
    '',
    '?person=demo-student',
    '?action=version%20saved',
    '?from=2026-01-01&to=2026-02-01',
  ])
    await good(supervisor.get(`${inLab}/audit${filter}`));
  for (const path of [`${inLab}/invitations`, `${on}/links`]) await good(supervisor.get(path));
  await good(
    supervisor.send('put', `/hand-ins/${receipt.id}/review`, {
      baseRevision: 0,
      judgements: { fold: 'agrees' },
      remarks: [],
      outcome: 'sent back',
      note: 'Look at the end again.',
    }),
  );
  await good(student.post(`${assigned}/hand-ins`, handInBody()));
  await good(supervisor.post(`${assigned}/send-back`, { people: ['demo-student'], note: 'Once more.' }));
}

it('lists, searches, saves and reviews by indices alone', { timeout: 60_000 }, async () => {
  const supervisor = await server.person('supervisor');
  const student = await server.person('student');
  const { sequelize, reader } = server.database;
  const statements = new Set<string>();
  const { options } = sequelize as unknown as { options: { logging: ((line: string) => void) | false } };
  options.logging = (line) => statements.add(line.replace(/^Executing \(.*?\): /, ''));
  await walk(supervisor, student);
  await server.mailArrived();
  options.logging = false;

  const asked = [...statements].filter((one) => /^(SELECT|WITH|UPDATE|DELETE|INSERT)/.test(one));
  const ours = [...new Set([...asked, ...reader.texts])];
  for (const table of [
    'presets',
    'preset_words',
    'preset_versions',
    'assigned_people',
    'hand_ins',
    'reviews',
  ])
    expect([table, ours.some((one) => one.includes(table))]).toEqual([table, true]);
  expect(ours.length).toBeGreaterThan(80);
  const scans: { statement: string; scan: string }[] = [];
  for (const statement of ours) {
    const plan = await sequelize.query<{ detail: string }>(`EXPLAIN QUERY PLAN ${statement}`, {
      type: QueryTypes.SELECT,
    });
    for (const { detail } of plan)
      if (detail.startsWith('SCAN') && !BOUNDED.some((one) => one.test(detail)))
        scans.push({ statement: statement.slice(0, 300), scan: detail });
  }
  expect(scans).toEqual([]);
});

it('tells a scan when there is one', async () => {
  const plan = await server.database.sequelize.query<{ detail: string }>(
    'EXPLAIN QUERY PLAN SELECT id FROM presets ORDER BY changedAt',
    { type: QueryTypes.SELECT },
  );
  expect(
    plan.some(({ detail }) => detail.startsWith('SCAN') && !BOUNDED.some((one) => one.test(detail))),
  ).toBe(true);
});
