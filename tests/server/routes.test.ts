import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import type { AssignedBody } from '@/contract/assigned-sweeps';
import type { PresetBody } from '@/contract/presets';
import type { Role } from '@/contract/rights';

import { makeUnsubscribeToken } from '../../server/mail/unsubscribe-token';
import { DEMO_LAB } from '../../server/seeds/demo';
import { handInBody, openSweep, workBody } from '../support/assigned';
import { sampleDocument, startTestServer, Visitor, type TestServer } from '../support/test-server';

type Who = 'visitor' | Role | 'outsider';
type Method = 'get' | 'post' | 'patch' | 'delete' | 'put';
interface Row {
  readonly method: Method;
  readonly path: string;
  readonly body?: () => unknown;
  /** Status by who asks. */
  readonly expect: Readonly<Record<Who, number>>;
}

let server: TestServer;
const people = new Map<Who, Visitor>();
/** Presets of the researcher: one private, one open to the lab. */
let own: PresetBody;
let lab: PresetBody;
/** For the student, and what they handed in. */
let sweep: AssignedBody;
let handInId = '';
let token = '';
let linkId = '';
/** Of the supervisor, on the lab's preset. */
let commentId = '';

const all = (status: number, visitor = status): Record<Who, number> => ({
  visitor,
  supervisor: status,
  researcher: status,
  student: status,
  collaborator: status,
  outsider: status,
});
const signedInOnly = (status: number) => all(status, 401);
const by = (row: Partial<Record<Who, number>>): Record<Who, number> => ({ ...signedInOnly(404), ...row });

beforeAll(async () => {
  server = await startTestServer();
  for (const role of ['supervisor', 'researcher', 'student', 'collaborator'] as const) {
    people.set(role, await server.person(role));
  }
  people.set('visitor', new Visitor(server.app));
  const outsider = new Visitor(server.app);
  await outsider.post('/accounts', {
    name: 'Out Sider',
    email: 'out@example.org',
    password: 'a long enough one',
  });
  await server.mailArrived();
  const mail = (await server.mailbox.list())[0];
  const confirm = /confirm\?token=([\w-]+)/.exec(mail?.text ?? '')?.[1];
  expect((await outsider.post('/accounts/confirm', { token: confirm })).status).toBe(201);
  people.set('outsider', outsider);
  const researcher = people.get('researcher');
  own = (await researcher?.post('/presets', { document: sampleDocument('Own') }))?.body as PresetBody;
  lab = (
    await researcher?.post('/presets', {
      document: sampleDocument('Lab'),
      visibility: 'lab',
      labId: DEMO_LAB.id,
    })
  )?.body as PresetBody;
  const made = await researcher?.post(`/presets/${lab.preset.id}/links`, { label: 'for a reviewer' });
  token = (made?.body as { token: string }).token;
  linkId = (made?.body as { link: { id: string } }).link.id;
  const supervisor = await server.person('supervisor');
  const commented = await supervisor.post(`/presets/${lab.preset.id}/comments`, { text: 'A comment' });
  commentId = (commented.body as { id: string }).id;
  sweep = await openSweep(supervisor, lab.preset.id, ['demo-student']);
  const handed = await people.get('student')?.post(`/assigned/${sweep.id}/hand-ins`, handInBody());
  handInId = (handed?.body as { id: string }).id;
});
afterAll(() => server.close());

const stopToken = () =>
  makeUnsubscribeToken(
    { address: 'someone@example.org', scope: 'all' },
    server.dependencies.settings.sessionSecret,
  );
const onLab = (rest: string) => `/presets/${lab.preset.id}${rest}`;
const inLab = (rest: string) => `/labs/${DEMO_LAB.id}${rest}`;
/** For supervisors alone: others of the lab are refused, and for outsiders there is no such lab. */
const supervised = (status: number) => ({ ...signedInOnly(403), supervisor: status, outsider: 404 });
/** For the student whom the sweep is for; a supervisor hands nothing in, and for others it does not exist. */
const assignee = (status: number) => by({ supervisor: 403, student: status });
/** A hand-in does not exist for anyone but those who review. */
const reviewer = (status: number) => by({ supervisor: status });
const stale = () => ({ baseRevision: 999 });
const save = () => ({ document: sampleDocument('Changed'), note: '', baseVersion: 999 });

/** Every route that exists, with what each may get. Saves use a stale base, so that nothing changes: 409 means allowed. */
const rows = (): Row[] => [
  { method: 'get', path: '/health', expect: all(200) },
  { method: 'get', path: '/ready', expect: all(200) },
  { method: 'get', path: '/session', expect: all(200) },
  { method: 'post', path: '/session', body: () => ({}), expect: all(400) },
  { method: 'post', path: '/accounts', body: () => ({}), expect: all(400) },
  { method: 'post', path: '/accounts/confirm', body: () => ({ token: 'x'.repeat(43) }), expect: all(400) },
  {
    method: 'post',
    path: '/password/forgotten',
    body: () => ({ email: 'nobody@example.org' }),
    expect: all(202),
  },
  {
    method: 'post',
    path: '/password/reset',
    body: () => ({ token: 'x'.repeat(43), password: 'long enough here' }),
    expect: all(400),
  },
  {
    method: 'post',
    path: '/password/change',
    body: () => ({ current: 'wrong', next: 'long enough here' }),
    expect: signedInOnly(400),
  },
  { method: 'patch', path: '/account', body: () => ({ name: '' }), expect: signedInOnly(400) },
  { method: 'get', path: '/account/sessions', expect: signedInOnly(200) },
  { method: 'delete', path: '/account/sessions/nothing', expect: signedInOnly(404) },
  { method: 'get', path: '/account/export.zip', expect: signedInOnly(200) },
  { method: 'get', path: inLab('/export.zip'), expect: supervised(200) },
  { method: 'get', path: '/labs/none/export.zip', expect: signedInOnly(404) },
  { method: 'get', path: '/account/deletion', expect: signedInOnly(200) },
  {
    method: 'post',
    path: '/account/deletion',
    body: () => ({ password: '' }),
    expect: signedInOnly(400),
  },
  { method: 'get', path: '/account/audit', expect: signedInOnly(200) },
  { method: 'get', path: '/account/audit?page=0', expect: signedInOnly(400) },
  { method: 'get', path: `/labs/${DEMO_LAB.id}`, expect: { ...signedInOnly(200), outsider: 404 } },
  { method: 'get', path: '/labs/none', expect: signedInOnly(404) },
  { method: 'post', path: '/labs', body: () => ({ name: ' ' }), expect: signedInOnly(400) },
  { method: 'post', path: '/labs', body: () => ({ name: 'A lab of one' }), expect: signedInOnly(201) },
  { method: 'patch', path: inLab(''), body: () => ({ name: '' }), expect: supervised(400) },
  { method: 'patch', path: inLab(''), body: () => ({ name: DEMO_LAB.name }), expect: supervised(200) },
  {
    method: 'patch',
    path: inLab('/members/demo-student'),
    body: () => ({ role: 'king' }),
    expect: supervised(400),
  },
  {
    method: 'patch',
    path: inLab('/members/nobody'),
    body: () => ({ role: 'student' }),
    expect: supervised(404),
  },
  {
    method: 'patch',
    path: inLab('/members/demo-student'),
    body: () => ({ role: 'student' }),
    expect: supervised(200),
  },
  { method: 'get', path: inLab('/members/nobody/departure'), expect: supervised(404) },
  {
    method: 'get',
    path: inLab('/members/demo-student/departure'),
    expect: { ...supervised(200), student: 200 },
  },
  { method: 'delete', path: inLab('/members/nobody'), expect: supervised(404) },
  { method: 'get', path: inLab('/invitations'), expect: supervised(200) },
  { method: 'post', path: inLab('/invitations/preview'), body: () => ({}), expect: supervised(400) },
  {
    method: 'post',
    path: inLab('/invitations/preview'),
    body: () => ({ role: 'student', rows: [{ line: 1, email: 'x', role: '' }] }),
    expect: supervised(200),
  },
  {
    method: 'post',
    path: inLab('/invitations'),
    body: () => ({ invitations: [{ email: 'no address', role: 'student' }] }),
    expect: supervised(400),
  },
  {
    method: 'post',
    path: inLab('/invitations'),
    body: () => ({ invitations: [{ email: 'new@example.org', role: 'student' }] }),
    expect: supervised(201),
  },
  {
    method: 'post',
    path: inLab('/invitations/none/resend'),
    body: () => ({ days: 0 }),
    expect: supervised(400),
  },
  { method: 'post', path: inLab('/invitations/none/resend'), body: () => ({}), expect: supervised(404) },
  { method: 'delete', path: inLab('/invitations/none'), expect: supervised(404) },
  { method: 'get', path: '/invitations/wrong', expect: all(404) },
  { method: 'post', path: '/invitations/wrong/accept', expect: signedInOnly(404) },
  { method: 'post', path: '/invitations/wrong/confirm-address', expect: signedInOnly(404) },
  { method: 'post', path: '/invitations/wrong/decline', expect: all(404) },
  { method: 'post', path: '/invitations/wrong/sign-up', body: () => ({}), expect: all(400) },
  {
    method: 'post',
    path: '/invitations/wrong/sign-up',
    body: () => ({ name: 'X', password: 'long enough here' }),
    expect: all(404),
  },
  { method: 'get', path: '/account/invitations', expect: signedInOnly(200) },
  { method: 'post', path: '/account/invitations/none/accept', expect: signedInOnly(404) },
  { method: 'post', path: '/account/invitations/none/decline', expect: signedInOnly(404) },
  ...['audit', 'audit.csv'].flatMap((name): Row[] => [
    {
      method: 'get',
      path: `/labs/${DEMO_LAB.id}/${name}`,
      expect: { ...signedInOnly(403), supervisor: 200, outsider: 404 },
    },
    {
      method: 'get',
      path: `/labs/${DEMO_LAB.id}/${name}?action=nonsense`,
      expect: { ...signedInOnly(403), supervisor: 400, outsider: 404 },
    },
  ]),
  { method: 'get', path: '/account/mail', expect: signedInOnly(200) },
  {
    method: 'patch',
    path: '/account/mail',
    body: () => ({ timings: { account: 'off' } }),
    expect: signedInOnly(400),
  },
  { method: 'patch', path: '/account/mail', body: () => ({ digestHour: 8 }), expect: signedInOnly(200) },
  { method: 'get', path: '/mail/subscription?token=short', expect: all(400) },
  { method: 'get', path: `/mail/subscription?token=${stopToken()}`, expect: all(200) },
  { method: 'get', path: `/mail/unsubscribe?token=${stopToken()}`, expect: all(303) },
  { method: 'post', path: `/mail/unsubscribe?token=${stopToken()}x`, expect: all(400) },
  { method: 'post', path: `/mail/unsubscribe?token=${stopToken()}`, expect: all(200) },
  { method: 'post', path: `/mail/subscribe-again?token=${stopToken()}`, expect: all(200) },
  { method: 'get', path: '/presets', expect: signedInOnly(200) },
  { method: 'get', path: '/presets/choices', expect: signedInOnly(200) },
  { method: 'get', path: '/presets/deleted', expect: signedInOnly(200) },
  { method: 'post', path: '/presets/none/bring-back', expect: signedInOnly(404) },
  { method: 'post', path: '/presets', body: () => ({ document: {} }), expect: signedInOnly(400) },
  { method: 'get', path: '/presets/none', expect: signedInOnly(404) },
  { method: 'get', path: `/presets/${own.preset.id}`, expect: by({ researcher: 200 }) },
  { method: 'get', path: `/presets/${lab.preset.id}`, expect: { ...signedInOnly(200), outsider: 404 } },
  {
    method: 'patch',
    path: `/presets/${own.preset.id}`,
    body: () => ({ visibility: 'public' }),
    expect: by({ researcher: 400 }),
  },
  {
    method: 'patch',
    path: `/presets/${lab.preset.id}`,
    body: () => ({ visibility: 'public' }),
    expect: { ...signedInOnly(403), researcher: 400, outsider: 404 },
  },
  { method: 'post', path: `/presets/${own.preset.id}/versions`, body: save, expect: by({ researcher: 409 }) },
  {
    method: 'post',
    path: `/presets/${lab.preset.id}/versions`,
    body: save,
    expect: {
      visitor: 401,
      supervisor: 409,
      researcher: 409,
      student: 403,
      collaborator: 403,
      outsider: 404,
    },
  },
  {
    method: 'get',
    path: `/presets/${lab.preset.id}/versions`,
    expect: { ...signedInOnly(200), outsider: 404 },
  },
  {
    method: 'get',
    path: `/presets/${lab.preset.id}/versions/1`,
    expect: { ...signedInOnly(200), outsider: 404 },
  },
  { method: 'get', path: `/presets/${lab.preset.id}/versions/7`, expect: signedInOnly(404) },
  {
    method: 'post',
    path: `/presets/${lab.preset.id}/versions/1/restore`,
    body: () => ({ baseVersion: 999 }),
    expect: {
      visitor: 401,
      supervisor: 409,
      researcher: 409,
      student: 403,
      collaborator: 403,
      outsider: 404,
    },
  },
  {
    method: 'post',
    path: `/presets/${lab.preset.id}/duplicate`,
    body: () => ({}),
    expect: { ...signedInOnly(201), outsider: 404 },
  },
  {
    method: 'get',
    path: `/presets/${lab.preset.id}/links`,
    expect: {
      visitor: 401,
      supervisor: 200,
      researcher: 200,
      student: 403,
      collaborator: 403,
      outsider: 404,
    },
  },
  {
    method: 'post',
    path: `/presets/${lab.preset.id}/links`,
    body: () => ({ label: 'x'.repeat(9000) }),
    expect: {
      visitor: 401,
      supervisor: 400,
      researcher: 400,
      student: 403,
      collaborator: 403,
      outsider: 404,
    },
  },
  {
    method: 'delete',
    path: `/presets/${lab.preset.id}/links/none`,
    expect: {
      visitor: 401,
      supervisor: 404,
      researcher: 404,
      student: 403,
      collaborator: 403,
      outsider: 404,
    },
  },
  { method: 'get', path: onLab('/activity'), expect: { ...signedInOnly(200), outsider: 404 } },
  { method: 'get', path: `/presets/${own.preset.id}/activity`, expect: by({ researcher: 200 }) },
  { method: 'get', path: onLab('/comments'), expect: { ...signedInOnly(200), outsider: 404 } },
  { method: 'get', path: onLab('/comments?state=lost'), expect: { ...signedInOnly(400), outsider: 404 } },
  { method: 'get', path: `/presets/${own.preset.id}/comments`, expect: by({ researcher: 200 }) },
  { method: 'get', path: onLab('/comments/people'), expect: { ...signedInOnly(200), outsider: 404 } },
  {
    method: 'post',
    path: onLab('/comments'),
    body: () => ({}),
    expect: { ...signedInOnly(400), outsider: 404 },
  },
  {
    method: 'post',
    path: onLab('/comments'),
    body: () => ({ text: 'A reply', thread: commentId }),
    // The student has an unjudged sweep from this preset.
    expect: { ...signedInOnly(201), student: 403, outsider: 404 },
  },
  {
    method: 'patch',
    path: onLab(`/comments/${commentId}`),
    body: () => ({ text: 'Changed', revision: 999 }),
    expect: { ...signedInOnly(403), supervisor: 409, outsider: 404 },
  },
  {
    method: 'patch',
    path: onLab('/comments/none'),
    body: () => ({ text: 'Changed', revision: 1 }),
    expect: { ...signedInOnly(404), student: 403 },
  },
  { method: 'delete', path: onLab('/comments/none'), expect: { ...signedInOnly(404), student: 403 } },
  {
    method: 'put',
    path: onLab(`/comments/${commentId}/resolved`),
    body: () => ({ resolved: true }),
    expect: { ...signedInOnly(403), supervisor: 200, researcher: 200, outsider: 404 },
  },
  { method: 'get', path: inLab('/assigned'), expect: { ...signedInOnly(200), outsider: 404 } },
  { method: 'get', path: inLab('/assigned?state=lost'), expect: { ...signedInOnly(400), outsider: 404 } },
  { method: 'post', path: inLab('/assigned'), body: () => ({}), expect: supervised(400) },
  {
    method: 'post',
    path: inLab('/assigned'),
    body: () => ({ presetId: 'none', version: 1 }),
    expect: supervised(404),
  },
  {
    method: 'post',
    path: inLab('/assigned'),
    body: () => ({ presetId: lab.preset.id, version: 1 }),
    expect: supervised(201),
  },
  { method: 'get', path: '/assigned', expect: signedInOnly(200) },
  { method: 'get', path: '/assigned?page=0', expect: signedInOnly(400) },
  { method: 'get', path: '/assigned/none', expect: signedInOnly(404) },
  { method: 'get', path: `/assigned/${sweep.id}`, expect: supervised(200) },
  { method: 'patch', path: `/assigned/${sweep.id}`, body: () => ({}), expect: supervised(400) },
  { method: 'patch', path: `/assigned/${sweep.id}`, body: stale, expect: supervised(409) },
  { method: 'delete', path: `/assigned/${sweep.id}`, expect: supervised(409) },
  ...['open', 'close', 'again'].flatMap((step): Row[] => [
    { method: 'post', path: `/assigned/${sweep.id}/${step}`, body: () => ({}), expect: supervised(400) },
    { method: 'post', path: `/assigned/${sweep.id}/${step}`, body: stale, expect: supervised(409) },
  ]),
  { method: 'get', path: `/assigned/${sweep.id}/task`, expect: assignee(200) },
  { method: 'put', path: `/assigned/${sweep.id}/work`, body: () => ({}), expect: assignee(400) },
  { method: 'put', path: `/assigned/${sweep.id}/work`, body: () => workBody(999), expect: assignee(409) },
  { method: 'post', path: `/assigned/${sweep.id}/hand-ins`, body: () => ({}), expect: assignee(400) },
  { method: 'post', path: `/assigned/${sweep.id}/hand-ins`, body: () => handInBody(), expect: assignee(201) },
  { method: 'get', path: `/assigned/${sweep.id}/table`, expect: supervised(200) },
  { method: 'get', path: `/assigned/${sweep.id}/table.csv`, expect: supervised(200) },
  { method: 'post', path: `/assigned/${sweep.id}/send-back`, body: () => ({}), expect: supervised(400) },
  {
    method: 'post',
    path: `/assigned/${sweep.id}/send-back`,
    body: () => ({ people: ['nobody'], note: 'Once more.' }),
    expect: supervised(200),
  },
  { method: 'get', path: '/hand-ins/none', expect: signedInOnly(404) },
  { method: 'get', path: `/hand-ins/${handInId}`, expect: reviewer(200) },
  { method: 'put', path: `/hand-ins/${handInId}/review`, body: () => ({}), expect: reviewer(400) },
  {
    method: 'put',
    path: `/hand-ins/${handInId}/review`,
    body: () => ({ baseRevision: 9, judgements: {}, remarks: [], outcome: null, note: '' }),
    expect: reviewer(409),
  },
  { method: 'get', path: `/shared/${token}`, expect: all(200) },
  { method: 'get', path: '/shared/none', expect: all(404) },
  { method: 'post', path: `/shared/${token}/copy`, body: () => ({}), expect: signedInOnly(201) },
  { method: 'get', path: '/demo/accounts', expect: all(200) },
  { method: 'get', path: '/demo/mail', expect: all(200) },
  { method: 'get', path: '/demo/mail/none', expect: all(404) },
  // Last, because they end things.
  { method: 'delete', path: `/presets/${own.preset.id}`, expect: by({ researcher: 204 }) },
  {
    method: 'delete',
    path: `/presets/${lab.preset.id}`,
    expect: {
      visitor: 401,
      student: 403,
      collaborator: 403,
      outsider: 404,
      supervisor: 204,
      researcher: 404,
    },
  },
  { method: 'post', path: `/presets/${own.preset.id}/bring-back`, expect: by({ researcher: 204 }) },
  {
    method: 'post',
    path: `/presets/${lab.preset.id}/bring-back`,
    expect: {
      visitor: 401,
      student: 403,
      collaborator: 403,
      outsider: 404,
      supervisor: 204,
      researcher: 404,
    },
  },
  { method: 'delete', path: '/account/sessions', expect: signedInOnly(204) },
  { method: 'delete', path: '/session', expect: signedInOnly(204) },
];

const ORDER: readonly Who[] = ['visitor', 'outsider', 'collaborator', 'student', 'supervisor', 'researcher'];

async function ask(who: Who, { method, path, body }: Row) {
  const visitor = people.get(who);
  if (!visitor) throw new Error(who);
  return method === 'get' ? visitor.get(path) : visitor.send(method, path, body?.());
}

describe('every route with every role', () => {
  it('answers as the table says, and never with a fault of the server', async () => {
    const wrong: string[] = [];
    for (const row of rows()) {
      for (const who of ORDER) {
        const { status } = await ask(who, row);
        if (status !== row.expect[who])
          wrong.push(`${row.method} ${row.path} as ${who}: ${status}, not ${row.expect[who]}`);
      }
    }
    expect(wrong).toEqual([]);
  });

  it('knows every route of the application', () => {
    interface Layer {
      readonly route?: { readonly path: string; readonly methods: Readonly<Record<string, boolean>> };
      readonly handle?: { readonly stack?: readonly Layer[] };
    }
    const found: string[] = [];
    const walk = (layers: readonly Layer[]) => {
      for (const { route, handle } of layers) {
        if (route) for (const method of Object.keys(route.methods)) found.push(`${method} ${route.path}`);
        else if (handle?.stack) walk(handle.stack);
      }
    };
    walk((server.app as unknown as { router: { stack: Layer[] } }).router.stack);
    const shape = (path: string) =>
      path
        .replace(own.preset.id, ':id')
        .replace(lab.preset.id, ':id')
        .replace(sweep.id, ':id')
        .replace(handInId, ':id')
        .replace(/^\/(assigned|hand-ins)\/none/, '/$1/:id')
        .replace(/\/presets\/none/, '/presets/:id')
        .replace(/\/versions\/\d+/, '/versions/:number')
        .replace(/\/links\/none/, '/links/:linkId')
        .replace(commentId, ':commentId')
        .replace(/\/comments\/none/, '/comments/:commentId')
        .replace(/\/labs\/[^/]+/, '/labs/:labId')
        .replace(/\/members\/[^/]+/, '/members/:userId')
        .replace(/^\/invitations\/wrong/, '/invitations/:token')
        .replace(/^(\/labs\/:labId\/invitations)\/none/, '$1/:invitationId')
        .replace(/^\/account\/invitations\/none/, '/account/invitations/:id')
        .replace(/\?.*/, '')
        .replace(new RegExp(`/shared/(${token}|none)`), '/shared/:token')
        .replace(/\/sessions\/nothing/, '/sessions/:id')
        .replace(/\/mail\/none/, '/mail/:id');
    const covered = new Set(rows().map(({ method, path }) => `${method} ${shape(path)}`));
    expect(found.length).toBeGreaterThan(30);
    expect(found.filter((route) => !covered.has(route))).toEqual([]);
    expect(linkId).not.toBe('');
  });
});
