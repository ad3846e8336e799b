import { afterAll, beforeAll, expect, it } from 'vitest';

import type { AuditPage } from '@/contract/audit';
import type { PresetBody } from '@/contract/presets';

import { DEMO_LAB } from '../../server/seeds/demo';
import { sampleDocument, startTestServer, Visitor, type TestServer } from '../support/test-server';

let server: TestServer;
beforeAll(async () => {
  server = await startTestServer();
});
afterAll(() => server.close());

const path = `/labs/${DEMO_LAB.id}/audit`;

it('shows supervisors what was done to a preset of the lab, in order', async () => {
  const researcher = await server.person('researcher');
  const supervisor = await server.person('supervisor');
  const made = await researcher.post('/presets', {
    document: sampleDocument('=1+1 "newts"'),
    visibility: 'lab',
    labId: DEMO_LAB.id,
  });
  const { id } = (made.body as PresetBody).preset;
  await researcher.post(`/presets/${id}/versions`, {
    document: sampleDocument('=1+1 "newts"'),
    note: '',
    baseVersion: 1,
  });
  const link = await researcher.post(`/presets/${id}/links`, { label: 'reviewer' });
  await new Visitor(server.app).get(`/shared/${(link.body as { token: string }).token}`);
  await supervisor.send('delete', `/presets/${id}`);
  const page = (await supervisor.get(path)).body as AuditPage;
  expect(page.items.slice(0, 5).map(({ actor, action }) => [actor.name, action])).toEqual([
    ['Ada Fennimore', 'preset deleted'],
    ['A visitor', 'link opened'],
    ['Rui Maddock', 'link created'],
    ['Rui Maddock', 'version saved'],
    ['Rui Maddock', 'preset created'],
  ]);
  const opened = (await supervisor.get(`${path}?action=link%20opened`)).body as AuditPage;
  expect(opened.total).toBe(1);
  const mine = (await supervisor.get(`${path}?person=demo-supervisor`)).body as AuditPage;
  // Below it, the sweeps of the demo.
  expect(mine.items.map(({ action }) => action)).toEqual([
    'preset deleted',
    'sweep opened',
    'sweep drafted',
    'sweep drafted',
  ]);
  expect(((await supervisor.get(`${path}?to=2001-01-01`)).body as AuditPage).total).toBe(0);
  const csv = await supervisor.get(`${path}.csv`);
  expect(csv.headers['content-type']).toContain('text/csv');
  expect(csv.text).toContain(`"'=1+1 ""newts"""`);
});

it('writes nothing of a change that was refused', async () => {
  const supervisor = await server.person('supervisor');
  const before = ((await supervisor.get(path)).body as AuditPage).total;
  const student = await server.person('student');
  const list = (await student.get('/presets?kind=lab')).body as { items: { id: string }[] };
  expect((await student.send('delete', `/presets/${list.items[0]?.id}`)).status).toBe(403);
  expect(((await supervisor.get(path)).body as AuditPage).total).toBe(before);
});

it.each(["UPDATE audit_entries SET actorName = 'x'", 'DELETE FROM audit_entries'])(
  'is refused by the file itself: %s',
  async (statement) => {
    await expect(server.database.sequelize.query(statement)).rejects.toMatchObject({
      parent: { message: expect.stringMatching(/the history (never changes|is never deleted)/) as string },
    });
  },
);

it('shows everyone the events of their own account and nobody else’s', async () => {
  const student = await server.person('student');
  await new Visitor(server.app).signIn('student@demo.invalid', 'not the password');
  const researcher = await server.person('researcher');
  await researcher.post('/presets', { document: sampleDocument('Private newts') });
  const own = (await student.get('/account/audit')).body as AuditPage;
  const names = new Set(own.items.map(({ actor }) => actor.name));
  expect([...names]).toEqual(['Sanna Weldon']);
  const actions = own.items.map(({ action }) => action);
  expect(actions).toContain('signed in');
  expect(actions).toContain('sign-in refused');
  const theirs = (await researcher.get('/account/audit')).body as AuditPage;
  expect(theirs.items[0]).toMatchObject({ action: 'preset created', subject: 'Private newts' });
  expect(JSON.stringify(own)).not.toContain('Private newts');
});
