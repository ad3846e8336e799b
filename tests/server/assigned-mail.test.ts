import { Op } from 'sequelize';
import { afterEach, beforeEach, expect, it } from 'vitest';

import type { AssignedBody, Receipt } from '@/contract/assigned-sweeps';
import type { MailKind } from '@/contract/mail';
import type { PresetBody } from '@/contract/presets';

import { DEMO_LAB } from '../../server/seeds/demo';
import { documentWithAnswer, handInBody, inDays, openSweep } from '../support/assigned';
import { startTestServer, type TestServer, type Visitor } from '../support/test-server';

const STUDENT = 'student@demo.invalid';
let server: TestServer;
let supervisor: Visitor;
let student: Visitor;
let sweep: AssignedBody;
beforeEach(async () => {
  server = await startTestServer();
  supervisor = await server.person('supervisor');
  student = await server.person('student');
  const made = await supervisor.post('/presets', {
    document: documentWithAnswer(),
    visibility: 'lab',
    labId: DEMO_LAB.id,
  });
  sweep = await openSweep(supervisor, (made.body as PresetBody).preset.id, ['demo-student']);
});
afterEach(() => server.close());

const subjects = async (address: string) => {
  await server.mailArrived();
  return (await server.mailbox.list()).filter(({ to }) => to.includes(address)).map(({ subject }) => subject);
};
/** When the reminders that wait are to be sent. */
const reminders = async () => {
  const waiting = await server.database.models.MailMessage.findAll({
    where: { state: 'waiting', idempotencyKey: { [Op.like]: 'due soon %' } },
  });
  return waiting.map(({ address, dueAt }) => [address, dueAt.toISOString()]);
};
const dayBefore = (due: string | null) => new Date(Date.parse(due ?? '') - 24 * 60 * 60_000).toISOString();
const handIn = async () =>
  (await student.post(`/assigned/${sweep.id}/hand-ins`, handInBody())).body as Receipt;

it('tells of a sweep that was set, of the receipt and of what came back', async () => {
  expect(await subjects(STUDENT)).toEqual([`A sweep for you: ${sweep.title}`]);
  const { id, code } = await handIn();
  expect(await subjects(STUDENT)).toContain(`Received: ${sweep.title}`);
  expect((await server.mailbox.list()).some(({ text }) => text.includes(code))).toBe(true);
  await supervisor.send('put', `/hand-ins/${id}/review`, {
    ...{ baseRevision: 0, judgements: {}, remarks: [], outcome: 'agreed', note: '' },
  });
  expect(await subjects(STUDENT)).toContain(`Reviewed: ${sweep.title}`);
  await supervisor.post(`/assigned/${sweep.id}/send-back`, { people: ['demo-student'], note: 'Once more.' });
  expect(await subjects(STUDENT)).toContain(`Sent back: ${sweep.title}`);
});

it('tells those who review once a day, or at once where they want it', async () => {
  const { MailMessage } = server.database.models;
  const count = (state: 'waiting' | 'sent') =>
    MailMessage.count({ where: { kind: 'hand-ins' satisfies MailKind, state } });
  await handIn();
  await server.mailArrived();
  expect([await count('waiting'), await count('sent')]).toEqual([1, 0]);
  await supervisor.send('patch', '/account/mail', { timings: { 'hand-ins': 'at once' } });
  await handIn();
  await server.mailArrived();
  expect(await count('sent')).toBe(1);
});

it('reminds a day before it is due, and the reminder follows the due date', async () => {
  expect(await reminders()).toEqual([[STUDENT, dayBefore(sweep.dueAt)]]);
  const change = (dueAt: string, baseRevision: number) =>
    supervisor.send('patch', `/assigned/${sweep.id}`, { baseRevision, dueAt });
  const later = inDays(11);
  await change(later, sweep.revision);
  expect(await reminders()).toEqual([[STUDENT, dayBefore(later)]]);
  await change(inDays(0.5), sweep.revision + 1);
  expect(await reminders()).toEqual([]);
});

it('reminds nobody who handed in or left', async () => {
  await handIn();
  expect(await reminders()).toEqual([]);
  await supervisor.post(`/assigned/${sweep.id}/send-back`, { people: ['demo-student'], note: 'Once more.' });
  expect(await reminders()).toHaveLength(1);
  await supervisor.send('delete', `/labs/${DEMO_LAB.id}/members/demo-student`);
  expect(await reminders()).toEqual([]);
});

it('withholds reminders of a sweep that is closed', async () => {
  await supervisor.post(`/assigned/${sweep.id}/close`, { baseRevision: sweep.revision });
  expect(await reminders()).toEqual([]);
  await supervisor.post(`/assigned/${sweep.id}/open`, { baseRevision: sweep.revision + 1 });
  expect(await reminders()).toHaveLength(1);
});
