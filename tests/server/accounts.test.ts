import type { Express } from 'express';
import request from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import type { SessionBody, SessionList } from '@/contract/account';

import { createApp } from '../../server/app';
import { startTestServer, Visitor, type TestServer } from '../support/test-server';

let server: TestServer;
beforeAll(async () => {
  server = await startTestServer();
});
afterAll(() => server.close());

async function tokenFromMail(to: string, kind: 'confirm' | 'reset'): Promise<string> {
  await server.mailArrived();
  const messages = await server.mailbox.list();
  const text =
    messages.find((one) => one.to.includes(to) && one.text.includes(`/${kind}?token=`))?.text ?? '';
  return new RegExp(`/${kind}\\?token=([\\w-]+)`).exec(text)?.[1] ?? '';
}

async function signUp(email: string, password = 'frogs in the fen'): Promise<Visitor> {
  const visitor = new Visitor(server.app);
  await visitor.post('/accounts', { name: 'Nia Marsh', email, password });
  await visitor.post('/accounts/confirm', { token: await tokenFromMail(email, 'confirm') });
  return visitor;
}

/** The session cookie alone, to be carried to another run of the application on the same file. */
async function signInForCookie(email: string, password: string): Promise<string> {
  const visitor = new Visitor(server.app);
  const answer = await visitor.signIn(email, password);
  const cookies = ([] as string[]).concat(answer.headers['set-cookie'] ?? []);
  return cookies.find((one) => one.startsWith('moiety.session='))?.split(';')[0] ?? '';
}

async function sessionBy(cookie: string, app: Express): Promise<SessionBody> {
  return (await request(app).get('/api/session').set('cookie', cookie)).body as SessionBody;
}

describe('signing up', () => {
  it('makes an account by the mailed link, which works once', async () => {
    const visitor = new Visitor(server.app);
    const asked = await visitor.post('/accounts', {
      name: 'Nia Marsh',
      email: 'Nia@Example.org',
      password: 'frogs in the fen',
    });
    expect([asked.status, asked.body]).toEqual([202, { accepted: true }]);
    expect((await visitor.session()).user).toBeNull();
    const token = await tokenFromMail('nia@example.org', 'confirm');
    const confirmed = await visitor.post('/accounts/confirm', { token });
    expect(confirmed.status).toBe(201);
    expect((confirmed.body as SessionBody).user?.email).toBe('nia@example.org');
    expect((await new Visitor(server.app).post('/accounts/confirm', { token })).status).toBe(400);
  });

  it('answers a known address as an unknown one, and tells its owner by mail', async () => {
    await signUp('known@example.org');
    const ask = (email: string) =>
      new Visitor(server.app).post('/accounts', { name: 'X', email, password: 'something long' });
    const known = await ask('known@example.org');
    const unknown = await ask('unknown@example.org');
    expect([known.status, known.body]).toEqual([unknown.status, unknown.body]);
    await server.mailArrived();
    const subjects = (await server.mailbox.list())
      .filter((one) => one.to === 'known@example.org')
      .map((one) => one.subject);
    expect(subjects).toContain('You already have a Moiety account');
  });

  it('says what is wrong at each field', async () => {
    const answer = await new Visitor(server.app).post('/accounts', {
      name: ' ',
      email: 'no address',
      password: 'short',
    });
    const { fields } = (answer.body as { error: { fields: Record<string, string> } }).error;
    expect(answer.status).toBe(400);
    expect(fields).toMatchObject({
      name: 'A name is needed.',
      email: expect.stringContaining('e-mail address'),
      password: expect.stringContaining('10 characters'),
    });
  });
});

describe('signing in', () => {
  it('gives the same answer for a wrong password and an unknown address', async () => {
    await signUp('here@example.org');
    const wrong = await new Visitor(server.app).signIn('here@example.org', 'not the password');
    const nobody = await new Visitor(server.app).signIn('nobody@example.org', 'not the password');
    expect(wrong.status).toBe(401);
    const message = (body: unknown) => (body as { error: { message: string } }).error.message;
    expect(message(wrong.body)).toBe(message(nobody.body));
  });

  it('begins a session of another name than the one before', async () => {
    const visitor = await signUp('fix@example.org');
    const before = await server.database.models.SessionRecord.findAll();
    await visitor.signIn('fix@example.org', 'frogs in the fen');
    const after = await server.database.models.SessionRecord.findAll();
    const known = new Set(before.map((one) => one.sid));
    expect(after.some((one) => !known.has(one.sid))).toBe(true);
  });

  it('keeps passwords by a memory-hard hash', async () => {
    await signUp('hash@example.org');
    const user = await server.database.models.User.findOne({ where: { email: 'hash@example.org' } });
    expect(user?.passwordHash).toMatch(/^\$argon2id\$/);
  });
});

describe('passwords', () => {
  it('is reset by mail once, and ends every session', async () => {
    const visitor = await signUp('lost@example.org');
    const asked = await new Visitor(server.app).post('/password/forgotten', { email: 'lost@example.org' });
    const unknown = await new Visitor(server.app).post('/password/forgotten', { email: 'never@example.org' });
    expect([asked.status, asked.body]).toEqual([unknown.status, unknown.body]);
    const token = await tokenFromMail('lost@example.org', 'reset');
    const reset = { token, password: 'newts in the pond' };
    expect((await new Visitor(server.app).post('/password/reset', reset)).status).toBe(204);
    expect((await new Visitor(server.app).post('/password/reset', reset)).status).toBe(400);
    expect((await visitor.session()).user).toBeNull();
    expect((await new Visitor(server.app).signIn('lost@example.org', 'newts in the pond')).status).toBe(200);
  });

  it('is changed with the current one, and other sessions end', async () => {
    const visitor = await signUp('change@example.org');
    const other = new Visitor(server.app);
    await other.signIn('change@example.org', 'frogs in the fen');
    const refused = await visitor.post('/password/change', { current: 'wrong', next: 'toads in the hole' });
    expect([refused.status, (refused.body as { error: { fields: object } }).error.fields]).toEqual([
      400,
      { current: 'This is not your current password.' },
    ]);
    expect(
      (await visitor.post('/password/change', { current: 'frogs in the fen', next: 'toads in the hole' }))
        .status,
    ).toBe(200);
    expect((await other.session()).user).toBeNull();
    expect((await visitor.session()).user?.email).toBe('change@example.org');
  });
});

describe('sessions', () => {
  it('are listed, and ended one by one or all others at once', async () => {
    const visitor = await signUp('many@example.org');
    const others = [new Visitor(server.app), new Visitor(server.app), new Visitor(server.app)];
    for (const other of others) await other.signIn('many@example.org', 'frogs in the fen');
    const list = (await visitor.get('/account/sessions')).body as SessionList;
    expect(list.sessions).toHaveLength(4);
    expect(list.sessions.filter((one) => one.current)).toHaveLength(1);
    const one = list.sessions.find((session) => !session.current);
    expect((await visitor.send('delete', `/account/sessions/${one?.id}`)).status).toBe(204);
    expect((await visitor.send('delete', '/account/sessions')).status).toBe(204);
    expect(((await visitor.get('/account/sessions')).body as SessionList).sessions).toHaveLength(1);
    for (const other of others) expect((await other.session()).user).toBeNull();
  });

  it('move their end and the time last seen with a later visit', async () => {
    await signUp('rolling@example.org');
    const { SessionRecord, User } = server.database.models;
    const user = await User.findOne({ where: { email: 'rolling@example.org' } });
    const where = { userId: user?.id ?? '' };
    await SessionRecord.destroy({ where });
    const cookie = await signInForCookie('rolling@example.org', 'frogs in the fen');
    const past = new Date(Date.now() - 86_400_000);
    const soon = new Date(Date.now() + 60_000);
    // As a session of long ago stands: its end, noted when it began, is nearly there.
    const record = await SessionRecord.findOne({ where });
    const data = JSON.parse(record?.data ?? '{}') as { cookie: { expires: string } };
    data.cookie.expires = past.toISOString();
    await SessionRecord.update({ expires: soon, lastSeenAt: past, data: JSON.stringify(data) }, { where });
    // Restarted since, so that nothing is remembered.
    const restarted = createApp(server.dependencies);
    expect((await sessionBy(cookie, restarted)).user?.email).toBe('rolling@example.org');
    await server.database.queue.idle();
    const after = await SessionRecord.findOne({ where });
    expect(after?.expires.getTime()).toBeGreaterThan(soon.getTime());
    expect(after?.lastSeenAt.getTime()).toBeGreaterThan(past.getTime());
    await SessionRecord.update({ expires: past }, { where });
    expect((await sessionBy(cookie, restarted)).user).toBeNull();
  });

  it('cannot be ended by someone else', async () => {
    const mine = await signUp('mine@example.org');
    const theirs = await signUp('theirs@example.org');
    const [session] = ((await theirs.get('/account/sessions')).body as SessionList).sessions;
    expect((await mine.send('delete', `/account/sessions/${session?.id}`)).status).toBe(404);
  });
});

describe('without DEMO', () => {
  it('has no demo accounts and no mail page, even where they were seeded before', async () => {
    const plain = await startTestServer({ demo: false });
    const visitor = new Visitor(plain.app);
    expect((await visitor.get('/demo/accounts')).status).toBe(404);
    expect((await visitor.get('/demo/mail')).status).toBe(404);
    expect((await visitor.session()).demo).toBe(false);
    await plain.close();
  });

  it('lets in no one of the demo, be they seeded or signed in before', async () => {
    const { dependencies } = server;
    const cookie = await signInForCookie('student@demo.invalid', 'springtails by sex');
    expect((await sessionBy(cookie, server.app)).user?.demo).toBe(true);
    const settings = { ...dependencies.settings, demo: false };
    const outside = createApp({ ...dependencies, settings, mailbox: null });
    expect((await sessionBy(cookie, outside)).user).toBeNull();
    const again = await new Visitor(outside).signIn('student@demo.invalid', 'springtails by sex');
    expect(again.status).toBe(401);
  });
});
