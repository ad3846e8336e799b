import { afterEach, beforeEach, describe, expect, it } from 'vitest';

import {
  assignedPageSchema,
  assignedSchema,
  peopleTableSchema,
  receiptSchema,
  reviewedHandInSchema,
  taskSchema,
  type AssignedBody,
  type AssignedPage,
  type PeopleTable,
  type Receipt,
  type ReviewedHandIn,
  type Task,
} from '@/contract/assigned-sweeps';
import type { AuditPage } from '@/contract/audit';
import type { PresetBody } from '@/contract/presets';

import { DEMO_LAB } from '../../server/seeds/demo';
import {
  documentWithAnswer,
  draftSweep,
  handInBody,
  inDays,
  openSweep,
  wantedWork,
  workBody,
} from '../support/assigned';
import { sampleDocument, startTestServer, type TestServer, type Visitor } from '../support/test-server';

const LAB = `/labs/${DEMO_LAB.id}`;
let server: TestServer;
let supervisor: Visitor;
let student: Visitor;
let presetId: string;
beforeEach(async () => {
  server = await startTestServer();
  supervisor = await server.person('supervisor');
  student = await server.person('student');
  const made = await supervisor.post('/presets', {
    document: documentWithAnswer(),
    visibility: 'lab',
    labId: DEMO_LAB.id,
  });
  presetId = (made.body as PresetBody).preset.id;
});
afterEach(() => server.close());

const words = (body: unknown) => (body as { error: { message: string } }).error.message;
const fields = (body: unknown) => (body as { error: { fields: Record<string, string> } }).error.fields;
const open = (people: string[], change = {}) => openSweep(supervisor, presetId, people, change);
const taskOf = async (visitor: Visitor, id: string) =>
  (await visitor.get(`/assigned/${id}/task`)).body as Task;
const handIn = (visitor: Visitor, id: string, body = handInBody()) =>
  visitor.post(`/assigned/${id}/hand-ins`, body);
const review = (id: string, baseRevision: number, outcome: string | null, more = {}) =>
  supervisor.send('put', `/hand-ins/${id}/review`, {
    ...{ baseRevision, judgements: {}, remarks: [], outcome, note: '' },
    ...more,
  });
const tableOf = async (id: string) => (await supervisor.get(`/assigned/${id}/table`)).body as PeopleTable;

it('goes from a draft to agreement, with everything as the contract has it', async () => {
  const draft = assignedSchema.parse((await draftSweep(supervisor, presetId)) satisfies AssignedBody);
  expect(draft.obstacles).toEqual(['Nobody is chosen whom it is for.', 'It has no due date.']);
  const path = `/assigned/${draft.id}`;
  const early = await supervisor.post(`${path}/open`, { baseRevision: draft.revision });
  expect([early.status, words(early.body)]).toEqual([409, expect.stringContaining('no due date')]);
  expect((await student.get(`${path}/task`)).status).toBe(404);
  const ready = await supervisor.send('patch', path, {
    baseRevision: draft.revision,
    people: ['demo-student'],
    dueAt: inDays(3),
  });
  const { revision } = ready.body as AssignedBody;
  expect((await supervisor.post(`${path}/open`, { baseRevision: revision })).status).toBe(200);

  expect(taskSchema.parse(await taskOf(student, draft.id))).toMatchObject({ mine: 'untouched', work: null });
  expect((await student.send('put', `${path}/work`, workBody())).body).toMatchObject({ revision: 1 });
  expect((await taskOf(student, draft.id)).mine).toBe('running');
  const receipt = receiptSchema.parse((await handIn(student, draft.id)).body);
  expect(receipt).toMatchObject({ number: 1, late: false });
  expect(receipt.code).toMatch(/^[0-9a-f]{12}$/);
  expect((await taskOf(student, draft.id)).mine).toBe('sent');

  const seen = reviewedHandInSchema.parse((await supervisor.get(`/hand-ins/${receipt.id}`)).body);
  expect(Object.values(seen.proposals).map(({ judgement }) => judgement)).toEqual(['agrees', 'agrees', null]);
  expect(seen.changes).toEqual([]);
  const agreed = await review(receipt.id, 0, 'agreed', {
    judgements: { fold: 'agrees', size: 'agrees', reading: 'agrees' },
    remarks: [{ id: 'r1', finding: 'fold', place: null, text: 'Well found.' }],
  });
  expect(reviewedHandInSchema.parse(agreed.body).review).toMatchObject({ revision: 1, by: 'Ada Fennimore' });
  const task = await taskOf(student, draft.id);
  expect([task.mine, task.handIns[0]?.review?.remarks[0]?.text]).toEqual(['agreed', 'Well found.']);
  const actions = ((await supervisor.get(`${LAB}/audit`)).body as AuditPage).items.map(
    ({ action }) => action,
  );
  expect(actions.slice(0, 4)).toEqual(['hand-in reviewed', 'handed in', 'sweep opened', 'sweep drafted']);
});

describe('what is handed in', () => {
  it('is kept once a key, also when the first answer was lost and the sweep closed', async () => {
    const sweep = await open(['demo-student']);
    const body = handInBody();
    const answers = await Promise.all([1, 2, 3].map(() => handIn(student, sweep.id, body)));
    expect(new Set(answers.map((one) => (one.body as Receipt).id)).size).toBe(1);
    await supervisor.post(`/assigned/${sweep.id}/close`, { baseRevision: sweep.revision });
    expect((await handIn(student, sweep.id, body)).body).toEqual(answers[0]?.body);
    const another = await handIn(student, sweep.id);
    expect([another.status, words(another.body)]).toEqual([409, expect.stringContaining('closed')]);
    const saved = await student.send('put', `/assigned/${sweep.id}/work`, workBody());
    expect(saved.status).toBe(409);
    const second = await open(['demo-student']);
    const reused = await handIn(student, second.id, body);
    expect([reused.status, fields(reused.body).key]).toEqual([400, expect.stringContaining('another sweep')]);
  });

  it('is numbered, late after the due date, and never changes', async () => {
    const sweep = await open(['demo-student']);
    const first = (await handIn(student, sweep.id)).body as Receipt;
    const { AssignedSweep } = server.database.models;
    await AssignedSweep.update({ dueAt: new Date(Date.now() - 1000) }, { where: { id: sweep.id } });
    const second = (await handIn(student, sweep.id)).body as Receipt;
    expect([first, second].map(({ number, late }) => [number, late])).toEqual([
      [1, false],
      [2, true],
    ]);
    const { sequelize } = server.database;
    for (const statement of ["UPDATE hand_ins SET frozen = '{}'", 'DELETE FROM hand_ins'])
      await expect(sequelize.query(statement)).rejects.toMatchObject({
        parent: { message: expect.stringContaining('never') as string },
      });
  });

  it('keeps to the locks and to the findings asked for', async () => {
    const sweep = await open(['demo-student']);
    const moved = sampleDocument();
    const [r] = moved.parameters;
    if (!r) throw new Error('The sample has a parameter.');
    const other = { ...moved, parameters: [{ ...r, symbol: 's' }] };
    const locked = await handIn(student, sweep.id, handInBody({ document: other }));
    expect([locked.status, fields(locked.body).document]).toEqual([400, expect.stringContaining('locked')]);
    const range = { parameter: 'r', from: 0, to: 1 };
    expect((await student.send('put', `/assigned/${sweep.id}/work`, workBody(0, { range }))).status).toBe(
      400,
    );
    const findings = [{ id: 'extra', value: 1, text: '', pin: null }];
    const stray = await handIn(student, sweep.id, handInBody({ findings }));
    expect(fields(stray.body)).toEqual({ 'findings.0.id': 'This finding is not asked for.' });
    expect((await taskOf(student, sweep.id)).mine).toBe('untouched');
  });

  it('may be larger than other bodies, and not without end', async () => {
    const sweep = await open(['demo-student']);
    const runs = 'x'.repeat(1_200_000);
    const large = { ...handInBody(), unknown: runs };
    expect((await handIn(student, sweep.id, large)).status).toBe(201);
    const work = { ...workBody(), unknown: runs };
    expect((await student.send('put', `/assigned/${sweep.id}/work`, work)).status).toBe(413);
    expect((await handIn(student, sweep.id, { ...large, unknown: runs + runs } as never)).status).toBe(413);
  });
});

it('never writes over work, sweeps or reviews that others changed meanwhile', async () => {
  const sweep = await open(['demo-student']);
  const put = (base: number) => student.send('put', `/assigned/${sweep.id}/work`, workBody(base));
  expect([(await put(0)).status, (await put(0)).status, (await put(1)).status]).toEqual([200, 409, 200]);
  const change = (base: number) =>
    supervisor.send('patch', `/assigned/${sweep.id}`, { baseRevision: base, title: 'Another title' });
  expect([(await change(sweep.revision)).status, (await change(sweep.revision)).status]).toEqual([200, 409]);
  const { id } = (await handIn(student, sweep.id)).body as Receipt;
  expect([(await review(id, 0, null)).status, (await review(id, 0, 'agreed')).status]).toEqual([200, 409]);
});

describe('an open sweep', () => {
  it('keeps its range, its locks and the kinds of its findings', async () => {
    const { id, revision } = await open(['demo-student']);
    const [fold] = wantedWork.wanted;
    for (const change of [
      { range: { parameter: 'r', from: 0, to: 1 } },
      { freedom: { parameters: 'all', range: true, model: false } },
      { wanted: [{ ...fold, point: 'Hopf' }] },
    ])
      expect(
        (await supervisor.send('patch', `/assigned/${id}`, { baseRevision: revision, ...change })).status,
      ).toBe(409);
  });

  it('lets nobody be taken out who began, and no supervisor in', async () => {
    const { id, revision } = await open(['demo-student']);
    await student.send('put', `/assigned/${id}/work`, workBody());
    const out = await supervisor.send('patch', `/assigned/${id}`, { baseRevision: revision, people: [] });
    expect([out.status, words(out.body)]).toEqual([409, expect.stringContaining('Sanna Weldon began')]);
    const people = ['demo-student', 'demo-supervisor'];
    const into = await supervisor.send('patch', `/assigned/${id}`, { baseRevision: revision, people });
    expect([into.status, fields(into.body).people]).toEqual([
      400,
      expect.stringContaining('sees the reference'),
    ]);
  });

  it('moves its proposals with its tolerances', async () => {
    const { id, revision } = await open(['demo-student']);
    const handed = (await handIn(student, id)).body as Receipt;
    const [fold, ...rest] = wantedWork.wanted;
    const wanted = [{ ...fold, tolerance: { kind: 'absolute', amount: 0.0001 } }, ...rest];
    const proposal = async () => {
      const { proposals } = (await supervisor.get(`/hand-ins/${handed.id}`)).body as ReviewedHandIn;
      return [proposals.fold?.judgement, (await tableOf(id)).rows[0]?.cells.fold?.proposal.judgement];
    };
    expect(await proposal()).toEqual(['agrees', 'agrees']);
    expect(
      (await supervisor.send('patch', `/assigned/${id}`, { baseRevision: revision, wanted })).status,
    ).toBe(200);
    expect(await proposal()).toEqual(['differs', 'differs']);
  });

  it('is closed, opened again with a due date to come, and set again as a draft', async () => {
    const { id, revision } = await open(['demo-student']);
    const closed = (await supervisor.post(`/assigned/${id}/close`, { baseRevision: revision }))
      .body as AssignedBody;
    const again = await supervisor.post(`/assigned/${id}/again`, { baseRevision: closed.revision });
    expect(again.status).toBe(201);
    expect(again.body).toMatchObject({ state: 'draft', people: [], dueAt: null, wanted: closed.wanted });
    expect((await supervisor.send('delete', `/assigned/${(again.body as AssignedBody).id}`)).status).toBe(
      204,
    );
    expect((await supervisor.send('delete', `/assigned/${id}`)).status).toBe(409);
    const reopened = await supervisor.post(`/assigned/${id}/open`, { baseRevision: closed.revision });
    expect(reopened.body).toMatchObject({ state: 'open', closedAt: null });
  });
});

describe('reviews', () => {
  it('send back one or all, and state follows the newest hand-in', async () => {
    const { id } = await open(['demo-student', 'demo-collaborator']);
    const collaborator = await server.person('collaborator');
    const first = (await handIn(student, id)).body as Receipt;
    await handIn(collaborator, id);
    const people = ['demo-student', 'demo-collaborator'];
    const back = await supervisor.post(`/assigned/${id}/send-back`, { people, note: 'Once more, finer.' });
    const table = peopleTableSchema.parse(back.body);
    expect(table.rows.map(({ state }) => state)).toEqual(['sent back', 'sent back']);
    expect((await taskOf(student, id)).handIns[0]?.review?.note).toBe('Once more, finer.');
    const second = (await handIn(student, id)).body as Receipt;
    await review(first.id, 1, 'differs');
    expect((await taskOf(student, id)).mine).toBe('sent');
    await review(second.id, 0, 'agreed');
    expect((await taskOf(student, id)).mine).toBe('agreed');
    await supervisor.post(`/assigned/${id}/send-back`, { people: ['demo-collaborator'], note: 'And again.' });
    expect((await taskOf(collaborator, id)).handIns[0]?.review).toMatchObject({ revision: 1 });
  });

  it('come as CSV that no spreadsheet takes for formulas', async () => {
    const { id } = await open(['demo-student']);
    const findings = [
      { id: 'fold', value: -0.5, text: '', pin: null },
      { id: 'reading', value: null, text: '=HYPERLINK("x")', pin: null },
    ];
    await handIn(student, id, handInBody({ findings }));
    const { text, headers } = await supervisor.get(`/assigned/${id}/table.csv`);
    expect(headers['content-type']).toContain('text/csv');
    const [head, row] = text.split('\r\n');
    expect(head).toContain('"The fold","The fold: proposal","The fold: judgement"');
    expect(row).toContain(',-0.5,"differs","",');
    expect(row).toContain(`"'=HYPERLINK(""x"")"`);
  });
});

it('is listed for those whom it is for, unfinished first, and counted for those who review', async () => {
  const later = await open(['demo-student'], { title: 'Later', dueAt: inDays(9) });
  const done = await open(['demo-student'], { title: 'Done', dueAt: inDays(1) });
  await open(['demo-collaborator'], { title: 'For another' });
  await handIn(student, done.id);
  const list = async (visitor: Visitor, path: string) =>
    assignedPageSchema.parse((await visitor.get(path)).body) satisfies AssignedPage;
  const mine = await list(student, '/assigned');
  expect(mine.items.map(({ title, mine: state }) => [title, state])).toEqual([
    ['The effort that loses the sturgeon', 'untouched'],
    ['Later', 'untouched'],
    ['Done', 'sent'],
  ]);
  expect(mine.items.every(({ counts }) => counts === null)).toBe(true);
  expect((await list(student, `${LAB}/assigned?state=draft`)).total).toBe(0);
  const all = await list(supervisor, `${LAB}/assigned`);
  expect(all.total).toBe(5);
  expect(all.items.find(({ id }) => id === done.id)?.counts).toMatchObject({ sent: 1, untouched: 0 });
  await supervisor.post(`/assigned/${later.id}/close`, { baseRevision: later.revision });
  expect((await list(supervisor, `${LAB}/assigned?state=closed`)).items.map(({ id }) => id)).toEqual([
    later.id,
  ]);
});

it('keeps what someone did who left, out of their reach until they are back', async () => {
  const { id } = await open(['demo-student']);
  await handIn(student, id);
  expect((await supervisor.send('delete', `${LAB}/members/demo-student`)).status).toBe(204);
  expect((await student.get(`/assigned/${id}/task`)).status).toBe(404);
  expect((await handIn(student, id)).status).toBe(404);
  expect(((await student.get('/assigned')).body as AssignedPage).total).toBe(0);
  expect((await tableOf(id)).rows[0]).toMatchObject({
    person: { name: 'Sanna Weldon' },
    member: false,
    state: 'sent',
  });
  await server.database.models.Membership.create({
    userId: 'demo-student',
    labId: DEMO_LAB.id,
    role: 'student',
  });
  expect((await taskOf(student, id)).mine).toBe('sent');
});
