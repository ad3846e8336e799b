import { afterEach, beforeEach, describe, expect, it } from 'vitest';

import type { AssignedBody, Receipt, Task } from '@/contract/assigned-sweeps';
import type { PresetBody } from '@/contract/presets';

import { DEMO_LAB } from '../../server/seeds/demo';
import {
  documentWithAnswer,
  handInBody,
  openSweep,
  SECRET_FACT,
  SECRET_VALUE,
  SECRET_WORDS,
  workBody,
} from '../support/assigned';
import { startTestServer, type TestServer, type Visitor } from '../support/test-server';

let server: TestServer;
let supervisor: Visitor;
let researcher: Visitor;
let student: Visitor;
let collaborator: Visitor;
let presetId: string;
let linkToken: string;
let sweep: AssignedBody;
beforeEach(async () => {
  server = await startTestServer();
  supervisor = await server.person('supervisor');
  researcher = await server.person('researcher');
  student = await server.person('student');
  collaborator = await server.person('collaborator');
  const made = await supervisor.post('/presets', {
    document: documentWithAnswer(),
    visibility: 'lab',
    labId: DEMO_LAB.id,
  });
  presetId = (made.body as PresetBody).preset.id;
  const link = await supervisor.post(`/presets/${presetId}/links`, { label: 'for a poster' });
  linkToken = (link.body as { token: string }).token;
  sweep = await openSweep(supervisor, presetId, ['demo-student', 'demo-collaborator', 'demo-researcher']);
});
afterEach(() => server.close());

const facts = (body: unknown) => (body as PresetBody).document.knownFacts.length;
const review = (id: string, outcome: string | null, baseRevision = 0) =>
  supervisor.send('put', `/hand-ins/${id}/review`, {
    baseRevision,
    judgements: { fold: 'agrees' },
    remarks: [],
    outcome,
    note: 'words of the review',
  });

/** Everything that answers an assignee about sweeps or the preset, as text. */
async function everythingFor(visitor: Visitor): Promise<string> {
  const sweepPath = `/assigned/${sweep.id}`;
  const answers = [
    await visitor.get(`${sweepPath}/task`),
    await visitor.get(sweepPath),
    await visitor.get(`${sweepPath}/table`),
    await visitor.get(`${sweepPath}/table.csv`),
    await visitor.get('/assigned'),
    await visitor.get(`/labs/${DEMO_LAB.id}/assigned`),
    await visitor.get('/presets'),
    await visitor.get(`/presets/${presetId}`),
    await visitor.get(`/presets/${presetId}/versions`),
    await visitor.get(`/presets/${presetId}/versions/1`),
    await visitor.get(`/shared/${linkToken}`),
    await visitor.post(`/presets/${presetId}/duplicate`, {}),
    await visitor.post(`/shared/${linkToken}/copy`, {}),
  ];
  return answers.map((answer) => answer.text).join('\n');
}

describe('an assignee before review', () => {
  it('is told no reference value, no known fact and nothing of what others did, by any route', async () => {
    await collaborator.send('put', `/assigned/${sweep.id}/work`, workBody());
    await collaborator.post(
      `/assigned/${sweep.id}/hand-ins`,
      handInBody({ note: 'work of the collaborator' }),
    );
    await student.send('put', `/assigned/${sweep.id}/work`, workBody());
    const own = await student.post(`/assigned/${sweep.id}/hand-ins`, handInBody());
    await review((own.body as Receipt).id, null);
    const text = await everythingFor(student);
    for (const secret of [
      String(SECRET_VALUE),
      SECRET_FACT,
      'work of the collaborator',
      'words of the review',
    ])
      expect(text).not.toContain(secret);
    expect((await student.get(`/assigned/${sweep.id}/task`)).text).not.toContain(SECRET_WORDS);
    // The same search finds them where they may be read.
    const seen = await everythingFor(supervisor);
    for (const secret of [String(SECRET_VALUE), SECRET_FACT]) expect(seen).toContain(secret);
  });

  it('finds no hand-in of others, nor their own by the page of reviewers', async () => {
    const { id } = (await collaborator.post(`/assigned/${sweep.id}/hand-ins`, handInBody())).body as Receipt;
    for (const visitor of [student, collaborator, researcher]) {
      expect((await visitor.get(`/hand-ins/${id}`)).status).toBe(404);
      const body = { baseRevision: 0, judgements: {}, remarks: [], outcome: 'agreed', note: '' };
      expect((await visitor.send('put', `/hand-ins/${id}/review`, body)).status).toBe(404);
    }
    expect(((await student.get(`/assigned/${sweep.id}/task`)).body as Task).handIns).toEqual([]);
  });

  it('keeps the facts of a lab preset in it when saving over them, unread', async () => {
    const open = (await researcher.get(`/presets/${presetId}`)).body as PresetBody;
    expect(facts(open)).toBe(0);
    const save = { document: open.document, note: 'tidied', baseVersion: 1 };
    const saved = await researcher.post(`/presets/${presetId}/versions`, save);
    expect([saved.status, facts(saved.body)]).toEqual([201, 0]);
    expect(facts((await supervisor.get(`/presets/${presetId}`)).body)).toBe(1);
    const restored = await researcher.post(`/presets/${presetId}/versions/1/restore`, { baseVersion: 2 });
    expect([restored.status, facts(restored.body)]).toEqual([201, 0]);
    expect(facts((await supervisor.get(`/presets/${presetId}`)).body)).toBe(1);
  });

  it('reads no such fact in a copy that someone else made', async () => {
    const copy = await supervisor.post('/presets', {
      document: documentWithAnswer('A copy'),
      visibility: 'lab',
      labId: DEMO_LAB.id,
    });
    const { id } = (copy.body as PresetBody).preset;
    expect(facts((await student.get(`/presets/${id}`)).body)).toBe(0);
    expect(facts((await supervisor.get(`/presets/${id}`)).body)).toBe(1);
  });
});

it('keeps facts from nobody whom no sweep is for, nor from the owner of a preset', async () => {
  const mine = await student.post('/presets', { document: documentWithAnswer('Mine') });
  const { id } = (mine.body as PresetBody).preset;
  const own = await openSweep(supervisor, presetId, ['demo-collaborator']);
  expect(own.state).toBe('open');
  expect(facts((await student.get(`/presets/${id}`)).body)).toBe(1);
  await supervisor.send('patch', `/assigned/${sweep.id}`, { baseRevision: sweep.revision, people: [] });
  expect(facts((await student.get(`/presets/${presetId}`)).body)).toBe(1);
  expect(facts((await collaborator.get(`/presets/${presetId}`)).body)).toBe(0);
});

it('gives facts back once judged, and the reference once closed too', async () => {
  const { id } = (await student.post(`/assigned/${sweep.id}/hand-ins`, handInBody())).body as Receipt;
  const task = async () => (await student.get(`/assigned/${sweep.id}/task`)).body as Task;
  expect((await review(id, 'agreed')).status).toBe(200);
  expect((await task()).reference).toBeNull();
  expect((await task()).handIns[0]?.review).toMatchObject({ outcome: 'agreed', note: 'words of the review' });
  expect(facts((await student.get(`/presets/${presetId}`)).body)).toBe(1);
  await supervisor.post(`/assigned/${sweep.id}/close`, { baseRevision: sweep.revision });
  expect((await task()).reference?.findings[0]?.value).toBe(SECRET_VALUE);
  // Not so for someone who was not judged.
  const other = (await collaborator.get(`/assigned/${sweep.id}/task`)).body as Task;
  expect([other.state, other.reference]).toEqual(['closed', null]);
  expect(facts((await collaborator.get(`/presets/${presetId}`)).body)).toBe(0);
});
