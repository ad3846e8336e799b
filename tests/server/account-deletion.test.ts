import { afterEach, beforeEach, describe, expect, it } from 'vitest';

import type { DeletionBody } from '@/contract/account-deletion';
import type { AuditPage } from '@/contract/audit';
import type { LabBody } from '@/contract/labs';
import type { PresetBody } from '@/contract/presets';

import { DEMO_LAB } from '../../server/seeds/demo';
import { sampleDocument, startTestServer, Visitor, type TestServer } from '../support/test-server';

let server: TestServer;
beforeEach(async () => {
  server = await startTestServer();
});
afterEach(() => server.close());

const words = (body: unknown) => (body as { error: { message: string } }).error.message;
const ACCOUNT = { name: 'Nia Marsh', email: 'nia@example.org', password: 'frogs in the fen' };

async function newestToken(page: string): Promise<string> {
  await server.mailArrived();
  const mail = (await server.mailbox.list()).find(({ text }) => text.includes(`/${page}?token=`));
  return new RegExp(`/${page}\\?token=([\\w-]+)`).exec(mail?.text ?? '')?.[1] ?? '';
}

/** Someone with an account who joined the demo lab as a researcher, a private preset and one open to the lab. */
async function member() {
  const nia = new Visitor(server.app);
  await nia.post('/accounts', ACCOUNT);
  await nia.post('/accounts/confirm', { token: await newestToken('confirm') });
  const supervisor = await server.person('supervisor');
  await supervisor.post(`/labs/${DEMO_LAB.id}/invitations`, {
    invitations: [{ email: ACCOUNT.email, role: 'researcher' }],
  });
  await nia.post(`/invitations/${await newestToken('join')}/accept`);
  const own = (await nia.post('/presets', { document: sampleDocument('Own newts') })).body as PresetBody;
  const lab = (
    await nia.post('/presets', {
      document: sampleDocument('Lab newts'),
      visibility: 'lab',
      labId: DEMO_LAB.id,
    })
  ).body as PresetBody;
  const link = (await nia.post(`/presets/${own.preset.id}/links`, { label: 'x' })).body as { token: string };
  return { nia, supervisor, own: own.preset.id, lab: lab.preset.id, token: link.token };
}

describe('deleting an account', () => {
  it('says first what goes and what stays', async () => {
    const { nia } = await member();
    const body = (await nia.get('/account/deletion')).body as DeletionBody;
    expect(body).toEqual({
      privatePresets: 1,
      labPresets: 1,
      links: 1,
      handIns: 0,
      comments: 0,
      labs: [{ name: DEMO_LAB.name, alone: false }],
      obstacles: [],
    });
  });

  it('takes presets and links of one’s own, leaves the lab what it has, and frees the address', async () => {
    const { nia, supervisor, own, lab, token } = await member();
    const second = new Visitor(server.app);
    await second.signIn(ACCOUNT.email, ACCOUNT.password);
    const wrong = await nia.post('/account/deletion', { password: 'not this one', anonymous: false });
    expect(wrong.status).toBe(400);
    expect((await nia.get('/account/sessions')).status).toBe(200);
    const done = await nia.post('/account/deletion', { password: ACCOUNT.password, anonymous: false });
    expect(done.status).toBe(204);
    for (const session of [nia, second]) expect((await session.get('/presets')).status).toBe(401);
    expect((await new Visitor(server.app).signIn(ACCOUNT.email, ACCOUNT.password)).status).toBe(401);
    expect((await new Visitor(server.app).get(`/shared/${token}`)).status).toBe(404);
    const kept = (await supervisor.get(`/presets/${lab}`)).body as PresetBody;
    expect([kept.preset.title, kept.preset.owner?.name]).toEqual(['Lab newts', 'Nia Marsh']);
    expect((await server.database.models.Preset.findByPk(own))?.deletedAt).toBeInstanceOf(Date);
    const { members } = (await supervisor.get(`/labs/${DEMO_LAB.id}`)).body as LabBody;
    expect(members.map(({ name }) => name)).not.toContain('Nia Marsh');
    const history = (await supervisor.get(`/labs/${DEMO_LAB.id}/audit`)).body as AuditPage;
    expect(history.items[0]).toMatchObject({ action: 'account deleted', actor: { name: 'Nia Marsh' } });
    await server.mailArrived();
    const mail = (await server.mailbox.list()).filter(({ to }) => to.includes(ACCOUNT.email));
    expect(mail.some(({ subject }) => subject === 'Your Moiety account was deleted')).toBe(true);

    const again = new Visitor(server.app);
    await again.post('/accounts', { ...ACCOUNT, name: 'Nia Anew' });
    await again.post('/accounts/confirm', { token: await newestToken('confirm') });
    const { user } = await again.session();
    expect(user).toMatchObject({ name: 'Nia Anew', memberships: [] });
  });

  it('takes the name along where that is asked for', async () => {
    const { nia, supervisor, lab } = await member();
    await nia.post('/account/deletion', { password: ACCOUNT.password, anonymous: true });
    const kept = (await supervisor.get(`/presets/${lab}`)).body as PresetBody;
    expect([kept.preset.owner?.name, kept.version.author]).toEqual(['Former member', 'Former member']);
  });

  it('is refused to the only supervisor of others, and to invented people', async () => {
    const { nia, supervisor } = await member();
    const made = (await nia.post('/labs', { name: 'Heath group' })).body as LabBody;
    const alone = (await nia.get('/account/deletion')).body as DeletionBody;
    expect(alone.labs).toContainEqual({ name: 'Heath group', alone: true });
    expect(alone.obstacles).toEqual([]);
    await nia.post(`/labs/${made.id}/invitations`, {
      invitations: [{ email: 'researcher@demo.invalid', role: 'student' }],
    });
    const researcher = await server.person('researcher');
    await researcher.post(`/invitations/${await newestToken('join')}/accept`);
    const body = (await nia.get('/account/deletion')).body as DeletionBody;
    expect(body.obstacles[0]).toContain('Heath group: A lab always keeps a supervisor');
    const refused = await nia.post('/account/deletion', { password: ACCOUNT.password, anonymous: false });
    expect([refused.status, words(refused.body)]).toEqual([
      409,
      expect.stringContaining('keeps a supervisor'),
    ]);
    const demo = await supervisor.post('/account/deletion', {
      password: 'springtails by sex',
      anonymous: false,
    });
    expect([demo.status, words(demo.body)]).toEqual([403, expect.stringContaining('Invented people')]);
  });
});
