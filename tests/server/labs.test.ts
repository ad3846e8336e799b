import { afterEach, beforeEach, describe, expect, it } from 'vitest';

import type { SessionBody } from '@/contract/account';
import type { AuditPage } from '@/contract/audit';
import type {
  DepartureBody,
  InvitationBody,
  InvitationList,
  InvitationPreview,
  LabBody,
  OwnInvitations,
} from '@/contract/labs';
import type { PresetBody, PresetPage } from '@/contract/presets';

import { changeRole, endMembership } from '../../server/commands/member-commands';
import { readPerson, type Person } from '../../server/middleware/current-user';
import { createMigrator } from '../../server/migrations';
import { DEMO_LAB } from '../../server/seeds/demo';
import { sampleDocument, startTestServer, Visitor, type TestServer } from '../support/test-server';

const LAB = `/labs/${DEMO_LAB.id}`;
let server: TestServer;
let supervisor: Visitor;
beforeEach(async () => {
  server = await startTestServer();
  supervisor = await server.person('supervisor');
});
afterEach(() => server.close());

const words = (body: unknown) => (body as { error: { message: string } }).error.message;
const invite = (email: string, role = 'student') =>
  supervisor.post(`${LAB}/invitations`, { invitations: [{ email, role }] });

/** The newest link of a kind in the mail to an address. */
async function linkTo(address: string, page: 'join' | 'confirm'): Promise<string> {
  await server.mailArrived();
  const mail = (await server.mailbox.list()).find(
    (one) => one.to.includes(address) && one.text.includes(`/${page}?token=`),
  );
  return new RegExp(`/${page}\\?token=([\\w-]+)`).exec(mail?.text ?? '')?.[1] ?? '';
}

async function signUp(email: string): Promise<Visitor> {
  const visitor = new Visitor(server.app);
  await visitor.post('/accounts', { name: 'Nia Marsh', email, password: 'frogs in the fen' });
  await visitor.post('/accounts/confirm', { token: await linkTo(email, 'confirm') });
  return visitor;
}

const rolesIn = async (visitor: Visitor) =>
  Object.fromEntries(
    ((await visitor.get(LAB)).body as LabBody).members.map(({ name, role }) => [name, role]),
  );

describe('labs', () => {
  it('are several a person, each with a role of its own', async () => {
    const student = await server.person('student');
    const made = await student.post('/labs', { name: 'Heath group' });
    expect([made.status, (made.body as LabBody).role]).toEqual([201, 'supervisor']);
    const { user } = await student.session();
    expect(user?.memberships.map(({ labName, role }) => [labName, role])).toEqual([
      [DEMO_LAB.name, 'student'],
      ['Heath group', 'supervisor'],
    ]);
    const { id } = made.body as LabBody;
    expect((await student.send('patch', `/labs/${id}`, { name: 'Bog group' })).status).toBe(200);
    expect(((await student.get(`/labs/${id}`)).body as LabBody).name).toBe('Bog group');
    expect((await supervisor.get(`/labs/${id}`)).status).toBe(404);
  });

  it('have names that read as they are', async () => {
    for (const name of ['', 'a\nb', 'evil \u202e bal', 'x'.repeat(81)])
      expect((await supervisor.post('/labs', { name })).status).toBe(400);
  });

  it('show addresses to those who may invite, and to nobody else', async () => {
    const emails = async (visitor: Visitor) =>
      ((await visitor.get(LAB)).body as LabBody).members.map(({ email }) => email);
    expect(await emails(supervisor)).toContain('student@demo.invalid');
    expect(new Set(await emails(await server.person('student')))).toEqual(new Set([null]));
  });
});

describe('an invitation', () => {
  it('is accepted from the mail by someone who signs up with it, once', async () => {
    expect((await invite('new@example.org', 'researcher')).status).toBe(201);
    const token = await linkTo('new@example.org', 'join');
    const visitor = new Visitor(server.app);
    const { body } = await visitor.get(`/invitations/${token}`);
    expect(body).toMatchObject({
      labName: DEMO_LAB.name,
      role: 'researcher',
      invitedBy: 'Ada Fennimore',
      email: 'new@example.org',
      mine: false,
    });
    const signedUp = await visitor.post(`/invitations/${token}/sign-up`, {
      name: 'Nell Reed',
      password: 'frogs in the fen',
    });
    expect(signedUp.status).toBe(201);
    expect((signedUp.body as SessionBody).user?.memberships).toMatchObject([{ role: 'researcher' }]);
    const again = await new Visitor(server.app).get(`/invitations/${token}`);
    expect([again.status, words(again.body)]).toEqual([400, expect.stringContaining('accepted already')]);
    const history = (await supervisor.get(`${LAB}/audit`)).body as AuditPage;
    expect(history.items.slice(0, 2).map(({ action, actor }) => [action, actor.name])).toEqual([
      ['invitation accepted', 'Nell Reed'],
      ['member invited', 'Ada Fennimore'],
    ]);
  });

  it('makes one account and one member of many presses at the same moment', async () => {
    await invite('new@example.org');
    const token = await linkTo('new@example.org', 'join');
    const statuses = await Promise.all(
      Array.from({ length: 6 }, async () => {
        const body = { name: 'Nell Reed', password: 'frogs in the fen' };
        return (await new Visitor(server.app).post(`/invitations/${token}/sign-up`, body)).status;
      }),
    );
    expect(statuses.sort()).toEqual([201, 400, 400, 400, 400, 400]);
  });

  it('is accepted by the account of its address, with the link or without', async () => {
    const nia = await signUp('nia@example.org');
    await invite('nia@EXAMPLE.org');
    const token = await linkTo('nia@example.org', 'join');
    expect(((await nia.get(`/invitations/${token}`)).body as InvitationBody).mine).toBe(true);
    const { invitations } = (await nia.get('/account/invitations')).body as OwnInvitations;
    expect(invitations).toHaveLength(1);
    const joined = await nia.post(`/account/invitations/${invitations[0]?.id}/accept`);
    expect([joined.status, joined.body]).toEqual([200, { labId: DEMO_LAB.id }]);
    expect((await nia.post(`/invitations/${token}/accept`)).status).toBe(400);
    expect(await rolesIn(nia)).toMatchObject({ 'Nia Marsh': 'student' });
  });

  it('is for its address alone, unless another is shown to belong to the same person', async () => {
    const nia = await signUp('nia@example.org');
    const thief = await signUp('thief@example.org');
    await invite('nia@work.example');
    const token = await linkTo('nia@work.example', 'join');
    const refused = await nia.post(`/invitations/${token}/accept`);
    expect([refused.status, words(refused.body)]).toEqual([403, expect.stringContaining('another address')]);
    expect((await nia.post(`/invitations/${token}/confirm-address`)).status).toBe(202);
    const confirmed = await linkTo('nia@work.example', 'join');
    expect(confirmed).not.toBe(token);
    expect((await thief.post(`/invitations/${confirmed}/accept`)).status).toBe(403);
    const stranger = { name: 'X', password: 'long enough here' };
    expect((await new Visitor(server.app).post(`/invitations/${confirmed}/sign-up`, stranger)).status).toBe(
      403,
    );
    expect((await nia.post(`/invitations/${confirmed}/accept`)).status).toBe(200);
    expect(await rolesIn(nia)).toMatchObject({ 'Nia Marsh': 'student' });
  });

  it('says what is the matter when it is wrong, withdrawn, declined or too old', async () => {
    const nia = await signUp('nia@example.org');
    const wrong = await nia.get(`/invitations/${'x'.repeat(43)}`);
    expect([wrong.status, words(wrong.body)]).toEqual([404, expect.stringContaining('incomplete')]);
    const ends: [string, RegExp, (id: string, token: string) => Promise<unknown>][] = [
      ['a@example.org', /withdrawn/, (id) => supervisor.send('delete', `${LAB}/invitations/${id}`)],
      [
        'b@example.org',
        /declined/,
        (_id, token) => new Visitor(server.app).post(`/invitations/${token}/decline`),
      ],
      [
        'c@example.org',
        /run out/,
        (id) => server.database.models.Invitation.update({ expiresAt: new Date(0) }, { where: { id } }),
      ],
    ];
    for (const [email, reason, end] of ends) {
      const { invitations } = (await invite(email)).body as InvitationList;
      const token = await linkTo(email, 'join');
      await end(invitations.find((one) => one.email === email)?.id ?? '', token);
      const answer = await nia.post(`/invitations/${token}/accept`);
      expect([answer.status, words(answer.body)]).toEqual([400, expect.stringMatching(reason)]);
    }
    expect(((await nia.session()).user?.memberships ?? []).length).toBe(0);
  });

  it('stands anew when it is sent again, and every link to it opens it', async () => {
    const { invitations } = (await invite('new@example.org')).body as InvitationList;
    const id = invitations[0]?.id ?? '';
    const first = await linkTo('new@example.org', 'join');
    await server.database.models.Invitation.update({ expiresAt: new Date(0) }, { where: { id } });
    const expired = ((await supervisor.get(`${LAB}/invitations`)).body as InvitationList).invitations;
    expect(expired[0]?.state).toBe('expired');
    const resent = await supervisor.post(`${LAB}/invitations/${id}/resend`, { days: 3 });
    expect([resent.status, (resent.body as InvitationList).invitations[0]?.state]).toEqual([200, 'open']);
    expect(await linkTo('new@example.org', 'join')).not.toBe(first);
    expect((await new Visitor(server.app).get(`/invitations/${first}`)).status).toBe(200);
    const list = ((await supervisor.get(`${LAB}/invitations`)).body as InvitationList).invitations;
    expect(list.map(({ mail }) => mail)).toEqual(['sent']);
  });

  it('does not flood an address, whoever asks', async () => {
    const { invitations } = (await invite('flooded@example.org')).body as InvitationList;
    const statuses: number[] = [];
    for (let k = 0; k < 6; k += 1)
      statuses.push((await supervisor.post(`${LAB}/invitations/${invitations[0]?.id}/resend`)).status);
    expect(statuses).toEqual([200, 200, 200, 200, 200, 429]);
    const student = await server.person('student');
    const { id } = (await student.post('/labs', { name: 'Other' })).body as LabBody;
    const elsewhere = await student.post(`/labs/${id}/invitations`, {
      invitations: [{ email: 'flooded@example.org', role: 'student' }],
    });
    expect(elsewhere.status).toBe(400);
  });

  it('answers alike for addresses with and without an account', async () => {
    await signUp('known@example.org');
    const shape = (body: unknown) =>
      (body as InvitationList).invitations.map(({ id, email, ...rest }) => ({
        ...rest,
        id: id.length,
        email: typeof email,
        createdAt: '',
        expiresAt: '',
      }))[0];
    const known = await invite('known@example.org');
    const unknown = await invite('unknown@example.org');
    expect([unknown.status, shape(unknown.body)]).toEqual([known.status, shape(known.body)]);
  });
});

describe('many invitations', () => {
  const rows = [
    ['good@example.org', ''],
    ['Other@Example.org', 'Researcher'],
    ['no address', ''],
    ['GOOD@example.org', 'student'],
    ['student@demo.invalid', 'student'],
    ['waiting@example.org', ''],
    ['fine@example.org', 'professor'],
  ].map(([email, role], k) => ({ line: k + 1, email, role }));

  it('are previewed row by row, and nothing is sent', async () => {
    await invite('waiting@example.org');
    const sent = (await server.database.models.MailMessage.count()) as number;
    const preview = (await supervisor.post(`${LAB}/invitations/preview`, { rows, role: 'student' }))
      .body as InvitationPreview;
    expect(preview.rows.map(({ line, role, problem }) => [line, role, problem])).toEqual([
      [1, 'student', null],
      [2, 'researcher', null],
      [3, 'student', 'malformed'],
      [4, 'student', 'duplicate'],
      [5, 'student', 'member'],
      [6, 'student', 'invited'],
      [7, 'professor', 'unknown role'],
    ]);
    expect(await server.database.models.MailMessage.count()).toBe(sent);
  });

  it('go out all of them or none', async () => {
    const bad = [
      { email: 'good@example.org', role: 'student' },
      { email: 'student@demo.invalid', role: 'student' },
    ];
    const refused = await supervisor.post(`${LAB}/invitations`, { invitations: bad });
    expect(refused.status).toBe(400);
    expect((refused.body as { error: { fields: object } }).error.fields).toEqual({
      'invitations.1.email': 'Someone with this address is a member already.',
    });
    expect(await server.database.models.Invitation.count()).toBe(0);
    const many = Array.from({ length: 40 }, (_one, k) => ({ email: `p${k}@example.org`, role: 'student' }));
    const taken = await supervisor.post(`${LAB}/invitations`, { invitations: many, days: 5 });
    expect((taken.body as InvitationList).invitations).toHaveLength(40);
    await server.mailArrived();
    expect(new Set((await server.mailbox.list()).map(({ to }) => to)).size).toBe(40);
  });

  it('to one address at the same moment make one invitation', async () => {
    const statuses = await Promise.all(
      Array.from({ length: 4 }, async () => (await invite('once@example.org')).status),
    );
    expect(statuses.sort()).toEqual([201, 400, 400, 400]);
  });
});

describe('roles and departures', () => {
  const member = (id: string) => `${LAB}/members/${id}`;
  const personOf = async (id: string) => (await readPerson(server.dependencies, id)) as Person;

  it('change, and the one concerned is told by mail', async () => {
    const changed = await supervisor.send('patch', member('demo-student'), { role: 'researcher' });
    expect(changed.status).toBe(200);
    await server.mailArrived();
    expect((await server.mailbox.list())[0]).toMatchObject({
      to: 'student@demo.invalid',
      subject: `You are now a researcher in ${DEMO_LAB.name}`,
    });
  });

  it('always leave a supervisor', async () => {
    for (const [method, body] of [
      ['patch', { role: 'student' }],
      ['delete', undefined],
    ] as const) {
      const refused = await supervisor.send(method, member('demo-supervisor'), body);
      expect([refused.status, words(refused.body)]).toEqual([409, expect.stringContaining('the only one')]);
    }
    const departure = (await supervisor.get(`${member('demo-supervisor')}/departure`)).body as DepartureBody;
    expect(departure.obstacle).toContain('the only one');
  });

  it('leave a supervisor when all of them give up or are put down at the same moment', async () => {
    const ids = ['demo-supervisor', 'demo-researcher', 'demo-student', 'demo-collaborator'];
    for (const id of ids) await supervisor.send('patch', member(id), { role: 'supervisor' });
    const people = await Promise.all(ids.map(personOf));
    const all = people.flatMap((person, k) => [
      changeRole(server.dependencies, person, DEMO_LAB.id, ids[(k + 1) % 4] ?? '', 'student'),
      changeRole(server.dependencies, person, DEMO_LAB.id, person.id, 'collaborator'),
      endMembership(server.dependencies, person, DEMO_LAB.id, person.id),
      endMembership(server.dependencies, person, DEMO_LAB.id, ids[(k + 2) % 4] ?? ''),
    ]);
    const outcomes = await Promise.allSettled(all);
    expect(outcomes.filter(({ status }) => status === 'rejected').length).toBeGreaterThan(0);
    const { Membership } = server.database.models;
    expect(await Membership.count({ where: { labId: DEMO_LAB.id, role: 'supervisor' } })).toBe(1);
  });

  it('over http leave a supervisor too, when two press at once', async () => {
    await supervisor.send('patch', member('demo-researcher'), { role: 'supervisor' });
    const other = await server.person('researcher');
    const answers = await Promise.all([
      supervisor.send('patch', member('demo-researcher'), { role: 'student' }),
      other.send('patch', member('demo-supervisor'), { role: 'student' }),
      supervisor.send('delete', member('demo-supervisor')),
      other.send('delete', member('demo-researcher')),
    ]);
    expect(answers.every(({ status }) => [200, 204, 403, 404, 409].includes(status))).toBe(true);
    const { Membership } = server.database.models;
    expect(await Membership.count({ where: { labId: DEMO_LAB.id, role: 'supervisor' } })).toBe(1);
  });

  it('keep the presets of the lab in the lab, and a copy with their owner', async () => {
    const researcher = await server.person('researcher');
    const made = (
      await researcher.post('/presets', {
        document: sampleDocument('Adders'),
        visibility: 'lab',
        labId: DEMO_LAB.id,
      })
    ).body as PresetBody;
    const path = `/presets/${made.preset.id}`;
    const departure = (await supervisor.get(`${member('demo-researcher')}/departure`)).body as DepartureBody;
    expect(departure).toMatchObject({ name: 'Rui Maddock', presets: 3, obstacle: null });
    expect((await supervisor.send('delete', member('demo-researcher'))).status).toBe(204);

    expect((await researcher.get(LAB)).status).toBe(404);
    for (const answer of [
      await researcher.get(path),
      await researcher.send('patch', path, { visibility: 'private' }),
      await researcher.send('delete', path),
      await researcher.post(`${path}/versions`, { document: sampleDocument(), note: '', baseVersion: 1 }),
    ])
      expect(answer.status).toBe(404);
    const { items } = (await researcher.get('/presets?kind=own')).body as PresetPage;
    expect(items.map(({ title, visibility }) => [title, visibility])).toContainEqual(['Adders', 'private']);
    expect(items).toHaveLength(3);
    expect(items.map(({ id }) => id)).not.toContain(made.preset.id);

    const kept = (await supervisor.get(path)).body as PresetBody;
    expect([kept.preset.title, kept.preset.owner?.name]).toEqual(['Adders', 'Rui Maddock']);
    expect(kept.rights).toContain('save');
    await server.mailArrived();
    expect((await server.mailbox.list())[0]?.text).toContain('you keep a private copy of each');
  });

  it('are possible for oneself, and told to supervisors the next morning', async () => {
    const student = await server.person('student');
    expect((await student.send('delete', member('demo-researcher'))).status).toBe(403);
    expect((await student.send('delete', member('demo-student'))).status).toBe(204);
    expect((await student.session()).user?.memberships).toEqual([]);
    const waiting = await server.database.models.MailMessage.findAll({ where: { state: 'waiting' } });
    expect(waiting.map(({ address, kind, content }) => [address, kind, content?.subject])).toEqual([
      ['supervisor@demo.invalid', 'people', `Sanna Weldon left ${DEMO_LAB.name}`],
    ]);
  });
});

describe('mail of a lab', () => {
  it('stops by one press on the header of a message, without a session', async () => {
    await supervisor.send('patch', `${LAB}/members/demo-student`, { role: 'researcher' });
    await server.mailArrived();
    const { unsubscribeUrl } = (await server.mailbox.list())[0] ?? {};
    const path =
      new URL(unsubscribeUrl ?? '').pathname.replace('/api', '') + new URL(unsubscribeUrl ?? '').search;
    const stopped = await new Visitor(server.app)
      .raw('post', path)
      .type('form')
      .set('origin', 'https://mail.example')
      .send('List-Unsubscribe=One-Click');
    expect([stopped.status, stopped.body]).toEqual([
      200,
      { address: 'student@demo.invalid', label: 'Your place in a lab', off: true },
    ]);
    const student = await server.person('student');
    expect((await student.get('/account/mail')).body).toMatchObject({ timings: { membership: 'off' } });
    await supervisor.send('patch', `${LAB}/members/demo-student`, { role: 'student' });
    await server.mailArrived();
    expect((await server.mailbox.list()).map(({ subject }) => subject)).not.toContain(
      `You are now a student in ${DEMO_LAB.name}`,
    );
    const other = path.replace(/token=./, 'token=A');
    expect((await new Visitor(server.app).raw('post', other)).status).toBe(400);
  });

  it('tells an inviter that an address takes no invitations', async () => {
    await server.database.models.MailSettings.create({
      address: 'deaf@example.org',
      timings: { invitations: 'off' },
      digestHour: 7,
      timeZone: 'UTC',
    });
    await invite('deaf@example.org');
    await server.mailArrived();
    const { invitations } = (await supervisor.get(`${LAB}/invitations`)).body as InvitationList;
    expect(invitations.map(({ mail }) => mail)).toEqual(['withheld']);
  });
});

it('migrations go back and forth with people and mail in place', async () => {
  await invite('new@example.org');
  await server.mailArrived();
  const migrator = createMigrator(server.database);
  await migrator.down({ to: '004-mail-queue' });
  const [left] = await server.database.sequelize.query(
    "SELECT name FROM sqlite_master WHERE name LIKE 'invitation%' OR name LIKE 'mail_%'",
  );
  expect(left).toEqual([]);
  await migrator.up();
  expect((await supervisor.get(LAB)).status).toBe(200);
  expect((await invite('new@example.org')).status).toBe(201);
});
