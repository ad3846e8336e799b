import { QueryTypes } from 'sequelize';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';

import type { ActivityPage } from '@/contract/activity';
import type { AuditPage } from '@/contract/audit';
import type { CommentPage, ThreadBody } from '@/contract/comments';
import type { PresetBody } from '@/contract/presets';

import { ACTIVITY_QUERY } from '../../server/commands/comments/activity';
import { createMigrator } from '../../server/migrations';
import { DEMO_LAB } from '../../server/seeds/demo';
import { openSweep } from '../support/assigned';
import { sampleDocument, startTestServer, type TestServer, type Visitor } from '../support/test-server';

let server: TestServer;
let supervisor: Visitor;
let researcher: Visitor;
let student: Visitor;
let collaborator: Visitor;
/** The researcher's, open to the lab. */
let preset: PresetBody;

const PIN = { model: 'split', kind: 'fold', parameter: 'r', value: 0.73, states: { x: 2 } } as const;

beforeEach(async () => {
  server = await startTestServer();
  supervisor = await server.person('supervisor');
  researcher = await server.person('researcher');
  student = await server.person('student');
  collaborator = await server.person('collaborator');
  const made = await researcher.post('/presets', {
    document: sampleDocument('Pond'),
    visibility: 'lab',
    labId: DEMO_LAB.id,
  });
  preset = made.body as PresetBody;
});
afterEach(() => server.close());

const at = (rest = '') => `/presets/${preset.preset.id}/comments${rest}`;
const write = async (who: Visitor, body: object) => (await who.post(at(), body)).body as ThreadBody;
const list = async (who: Visitor, query = '') => (await who.get(at(query))).body as CommentPage;
const words = (body: unknown) => (body as { error: { message: string } }).error.message;
const mailTo = async (address: string) => {
  await server.mailArrived();
  return (await server.mailbox.list()).filter(({ to }) => to.includes(address));
};

describe('comments', () => {
  it('stand on the preset, on a version, or on a special point, with replies', async () => {
    await write(student, { text: 'On the whole' });
    await write(student, { text: 'On a version', version: 1 });
    const pinned = await write(collaborator, { text: 'Why here?', version: 1, pin: PIN });
    await write(researcher, { text: 'Because of $r$', thread: pinned.id });
    const { items, open } = await list(supervisor);
    expect(open).toBe(3);
    expect(items.map(({ pin, version }) => [pin?.value ?? null, version])).toEqual([
      [0.73, 1],
      [null, 1],
      [null, null],
    ]);
    expect(items[0]?.pin).toEqual(PIN);
    expect(items[0]?.comments.map(({ text }) => text)).toEqual(['Why here?', 'Because of $r$']);
    expect((await list(student, `?thread=${pinned.id}`)).items.map(({ id }) => id)).toEqual([pinned.id]);
  });

  it('are refused where they would stand nowhere', async () => {
    const { id } = await write(student, { text: 'First' });
    const reply = await write(student, { text: 'Reply', thread: id });
    for (const body of [
      { text: '  ' },
      { text: 'x'.repeat(8001) },
      { text: 'x', pin: PIN },
      { text: 'x', thread: id, version: 1 },
      { text: 'x', thread: reply.comments[1]?.id },
      { text: 'x', version: 1, pin: { ...PIN, value: 'high' } },
    ])
      expect((await student.post(at(), body)).status).toBe(400);
    expect((await student.post(at(), { text: 'x', version: 9 })).status).toBe(404);
    expect((await student.post(at(), { text: 'x', thread: 'none' })).status).toBe(404);
    const page = (await student.get('/presets?kind=starter')).body as { items: { id: string }[] };
    const starter = page.items[0]?.id ?? '';
    expect((await student.post(`/presets/${starter}/comments`, { text: 'x' })).status).toBe(403);
  });

  it('are changed by their writer alone, and never over a newer text', async () => {
    const { id } = await write(student, { text: 'Frist' });
    const edited = await student.send('patch', at(`/${id}`), { text: 'First', revision: 1 });
    expect((edited.body as ThreadBody).comments[0]).toMatchObject({ text: 'First', revision: 2 });
    expect((edited.body as ThreadBody).comments[0]?.editedAt).not.toBeNull();
    const stale = await student.send('patch', at(`/${id}`), { text: 'Other', revision: 1 });
    expect([stale.status, words(stale.body)]).toEqual([409, expect.stringContaining('nothing was saved')]);
    expect((await list(student)).items[0]?.comments[0]?.text).toBe('First');
    for (const method of ['patch', 'delete'] as const)
      expect((await supervisor.send(method, at(`/${id}`), { text: 'x', revision: 2 })).status).toBe(403);
  });

  it('leave a gap where they are replied to, and go whole with the last of a thread', async () => {
    const { id } = await write(student, { text: 'Secret first' });
    const thread = await write(researcher, { text: 'Reply', thread: id });
    expect((await student.send('delete', at(`/${id}`))).status).toBe(204);
    const left = (await list(student)).items[0]?.comments;
    expect(left?.map(({ text, deleted }) => [text, deleted])).toEqual([
      ['', true],
      ['Reply', false],
    ]);
    expect((await researcher.send('delete', at(`/${thread.comments[1]?.id}`))).status).toBe(204);
    expect((await list(student, '?state=all')).total).toBe(0);
    expect(await server.database.models.Comment.count()).toBe(0);
  });

  it('are resolved and reopened by the writer, the owner, and those who may save', async () => {
    const { id, mayResolve } = await write(student, { text: 'Settled?' });
    expect(mayResolve).toBe(true);
    const put = (who: Visitor, resolved: boolean) => who.send('put', at(`/${id}/resolved`), { resolved });
    expect((await put(collaborator, true)).status).toBe(403);
    for (const who of [student, researcher, supervisor]) {
      expect(((await put(who, true)).body as ThreadBody).resolved?.by).not.toBe('');
      expect([(await list(who)).total, (await list(who, '?state=resolved')).total]).toEqual([0, 1]);
      expect(((await put(who, false)).body as ThreadBody).resolved).toBeNull();
    }
    const history = (await supervisor.get(`/labs/${DEMO_LAB.id}/audit`)).body as AuditPage;
    expect(history.items.filter(({ action }) => action === 'comment resolved')).toHaveLength(3);
  });

  it('are mailed once to those mentioned and those replied to, never to the writer', async () => {
    const { id } = await write(student, {
      text: 'Look, @{demo-supervisor} @{demo-student}',
      version: 1,
      pin: PIN,
    });
    const [first, ...more] = await mailTo('supervisor@demo.invalid');
    expect(more).toEqual([]);
    expect(first?.text).toContain(`/presets/${preset.preset.id}?comment=${id}`);
    expect(first?.text).not.toContain('@{');
    await write(supervisor, { text: 'Yes, @{demo-student}', thread: id });
    expect(await mailTo('student@demo.invalid')).toHaveLength(1);
    expect(await mailTo('supervisor@demo.invalid')).toHaveLength(1);
    await student.send('patch', at(`/${id}`), { text: 'Look again, @{demo-supervisor}', revision: 1 });
    expect(await mailTo('supervisor@demo.invalid')).toHaveLength(1);
  });

  it('are not mailed to someone who has lost sight of the preset, and mention nobody outside', async () => {
    const { id } = await write(student, { text: 'Mine' });
    const gone = await supervisor.send('delete', `/labs/${DEMO_LAB.id}/members/demo-student`);
    expect(gone.status).toBe(204);
    const before = (await mailTo('student@demo.invalid')).length;
    const thread = await write(researcher, { text: 'Reply', thread: id });
    expect((await mailTo('student@demo.invalid')).length).toBe(before);
    expect(thread.comments[0]?.author.name).not.toBe('');
    const refused = await researcher.post(at(), { text: 'Hello @{demo-student}' });
    expect([refused.status, JSON.stringify(refused.body)]).toEqual([
      400,
      expect.stringContaining('cannot see this preset'),
    ]);
    expect((await student.get(at())).status).toBe(404);
    expect((await student.post(at(), { text: 'x' })).status).toBe(404);
  });

  it('follow a new name, and keep apart what belongs to another preset', async () => {
    const { id } = await write(researcher, { text: 'See @{demo-student}' });
    await student.send('patch', '/account', { name: 'Nia Marsh' });
    expect((await list(researcher)).items[0]?.comments[0]?.mentions).toEqual([
      { id: 'demo-student', name: 'Nia Marsh' },
    ]);
    const other = (await researcher.post('/presets', { document: sampleDocument('Own') })).body as PresetBody;
    const path = `/presets/${other.preset.id}/comments/${id}`;
    expect((await researcher.send('patch', path, { text: 'x', revision: 1 })).status).toBe(404);
    expect((await researcher.send('delete', path)).status).toBe(404);
    expect((await student.get(`/presets/${other.preset.id}/comments`)).status).toBe(404);
  });

  it('offer for mentioning those who may read them', async () => {
    const ids = async (who: Visitor, id: string) =>
      ((await who.get(`/presets/${id}/comments/people`)).body as { people: { id: string }[] }).people.map(
        (one) => one.id,
      );
    expect((await ids(student, preset.preset.id)).toSorted()).toEqual([
      'demo-collaborator',
      'demo-researcher',
      'demo-student',
      'demo-supervisor',
    ]);
    const own = (await student.post('/presets', { document: sampleDocument('Own') })).body as PresetBody;
    expect(await ids(student, own.preset.id)).toEqual(['demo-student']);
  });

  it('stay closed, by mail too, to whoever has an unjudged sweep from the preset', async () => {
    await openSweep(supervisor, preset.preset.id, ['demo-student']);
    const before = (await mailTo('student@demo.invalid')).length;
    await write(researcher, { text: 'The answer is 0.73, @{demo-student}', version: 1, pin: PIN });
    const page = await student.get(at('?state=all'));
    expect(page.body).toMatchObject({ held: true, items: [] });
    expect(JSON.stringify(page.body)).not.toContain('0.73');
    expect((await student.post(at(), { text: 'x' })).status).toBe(403);
    expect((await mailTo('student@demo.invalid')).length).toBe(before);
    expect((await list(collaborator)).items).toHaveLength(1);
  });
});

describe('the activity of a preset', () => {
  it('tells versions, comments and what the history knows, newest first, for those who may view', async () => {
    const { id } = await write(student, { text: 'Words of the comment' });
    await researcher.post(`/presets/${preset.preset.id}/versions`, {
      document: sampleDocument('Pond'),
      note: 'Second try',
      baseVersion: 1,
    });
    await researcher.send('put', at(`/${id}/resolved`), { resolved: true });
    const answer = await collaborator.get(`/presets/${preset.preset.id}/activity`);
    const { items, total } = answer.body as ActivityPage;
    expect(total).toBe(4);
    expect(items.map(({ sentence, version, note, thread }) => [sentence, version, note, thread])).toEqual([
      ['resolved a comment', null, '', id],
      ['saved a version', 2, 'Second try', null],
      ['commented', null, '', id],
      ['began a preset', 1, '', null],
    ]);
    expect(JSON.stringify(items)).not.toContain('Words of');
    const own = (await researcher.post('/presets', { document: sampleDocument('Own') })).body as PresetBody;
    expect((await student.get(`/presets/${own.preset.id}/activity`)).status).toBe(404);
  });

  it('is found by indexes', async () => {
    const plan = await server.database.sequelize.query<{ detail: string }>(
      `EXPLAIN QUERY PLAN ${ACTIVITY_QUERY}`,
      { replacements: { presetId: 'x', actions: ['link created'] }, type: QueryTypes.SELECT },
    );
    const details = plan.map(({ detail }) => detail).join('\n');
    expect(details).toContain('audit_by_preset');
    expect(details).toContain('comments_by_preset');
    expect(details).not.toMatch(/^SCAN/m);
  });
});

describe('the schema', () => {
  it('goes back before comments and forward again', async () => {
    const migrator = createMigrator(server.database);
    await migrator.down({ to: '007-comments-and-links' });
    await expect(server.database.models.Comment.count()).rejects.toThrow();
    await migrator.up();
    expect(await server.database.models.Comment.count()).toBe(0);
  });
});
