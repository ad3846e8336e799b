import { afterEach, beforeEach, describe, expect, it } from 'vitest';

import type { PresetBody, ShareLink, SharedBody } from '@/contract/presets';

import { DEMO_LAB } from '../../server/seeds/demo';
import { sampleDocument, startTestServer, Visitor, type TestServer } from '../support/test-server';

let server: TestServer;
let owner: Visitor;
let visitor: Visitor;
let preset: PresetBody;

beforeEach(async () => {
  server = await startTestServer();
  owner = await server.person('researcher');
  visitor = new Visitor(server.app);
  preset = (await owner.post('/presets', { document: sampleDocument('Pond') })).body as PresetBody;
});
afterEach(() => server.close());

const links = () => `/presets/${preset.preset.id}/links`;
const make = async (body: object) =>
  (await owner.post(links(), body)).body as { token: string; link: ShareLink };
const listed = async () => ((await owner.get(links())).body as { links: ShareLink[] }).links[0];
const soon = () => new Date(Date.now() + 60_000).toISOString();

describe('share links', () => {
  it('never end and allow a copy unless told otherwise', async () => {
    const { token, link } = await make({});
    expect(link).toMatchObject({ expiresAt: null, access: 'copy', opened: 0, lastOpenedAt: null });
    expect(((await visitor.get(`/shared/${token}`)).body as SharedBody).mayCopy).toBe(true);
    const student = await server.person('student');
    expect((await student.post(`/shared/${token}/copy`)).status).toBe(201);
  });

  it('for looking show everything and refuse a copy in words', async () => {
    const { token } = await make({ access: 'view' });
    expect(((await visitor.get(`/shared/${token}`)).body as SharedBody).mayCopy).toBe(false);
    const student = await server.person('student');
    const refused = await student.post(`/shared/${token}/copy`);
    expect([refused.status, JSON.stringify(refused.body)]).toEqual([
      403,
      expect.stringContaining('allows looking, not copying'),
    ]);
    expect((await visitor.post(`/shared/${token}/copy`)).status).toBe(401);
  });

  it('that have ended answer like withdrawn ones, and stay on the list', async () => {
    const ended = await make({ expiresAt: soon() });
    expect((await visitor.get(`/shared/${ended.token}`)).status).toBe(200);
    await server.database.models.ShareLink.update(
      { expiresAt: new Date(Date.now() - 1000) },
      { where: { id: ended.link.id } },
    );
    const withdrawn = await make({});
    await owner.send('delete', `${links()}/${withdrawn.link.id}`);
    const message = async (token: string) => {
      const { status, body } = await visitor.get(`/shared/${token}`);
      return [status, (body as { error: { message: string } }).error.message];
    };
    expect(await message(ended.token)).toEqual(await message(withdrawn.token));
    expect((await message(ended.token))[0]).toBe(404);
    const student = await server.person('student');
    expect((await student.post(`/shared/${ended.token}/copy`)).status).toBe(404);
    expect(((await owner.get(links())).body as { links: ShareLink[] }).links).toHaveLength(2);
  });

  it('do not end in the past, and take no other way of access', async () => {
    const past = new Date(Date.now() - 1000).toISOString();
    for (const body of [{ expiresAt: past }, { expiresAt: 'tomorrow' }, { access: 'edit' }])
      expect((await owner.post(links(), body)).status).toBe(400);
  });

  it('count openings with the time of the last', async () => {
    const { token } = await make({});
    const before = Date.now();
    await visitor.get(`/shared/${token}`);
    await visitor.get(`/shared/${token}`);
    const link = await listed();
    expect(link?.opened).toBe(2);
    expect(Date.parse(link?.lastOpenedAt ?? '')).toBeGreaterThanOrEqual(before - 1);
  });
});

describe('who sees a preset', () => {
  it('is not changed over a change that one has not seen', async () => {
    const change = (body: object) => owner.send('patch', `/presets/${preset.preset.id}`, body);
    const from = { visibility: 'private', labId: null };
    const open = { visibility: 'lab', labId: DEMO_LAB.id, from };
    expect((await change(open)).status).toBe(200);
    const stale = await change({ visibility: 'private', from });
    expect(stale.status).toBe(409);
    const now = (await owner.get(`/presets/${preset.preset.id}`)).body as PresetBody;
    expect(now.preset.visibility).toBe('lab');
    expect(
      (await change({ visibility: 'private', from: { visibility: 'lab', labId: DEMO_LAB.id } })).status,
    ).toBe(200);
  });
});
