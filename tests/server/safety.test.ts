import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { sampleDocument, startTestServer, Visitor, type TestServer } from '../support/test-server';

let server: TestServer;
let researcher: Visitor;
beforeAll(async () => {
  server = await startTestServer();
  researcher = await server.person('researcher');
});
afterAll(() => server.close());

const code = (body: unknown) => (body as { error?: { code?: string } }).error?.code;

describe('requests from elsewhere', () => {
  it('refuses a change without a token, with a forged one, and with one of another person', async () => {
    const body = { document: sampleDocument() };
    const without = await researcher.raw('post', '/presets').send(body);
    expect([without.status, code(without.body)]).toEqual([403, 'bad-token']);
    const forged = await researcher.raw('post', '/presets').set('x-csrf-token', 'A'.repeat(43)).send(body);
    expect([forged.status, code(forged.body)]).toEqual([403, 'bad-token']);
    const student = await server.person('student');
    const borrowed = await researcher.raw('post', '/presets').set('x-csrf-token', student.token).send(body);
    expect([borrowed.status, code(borrowed.body)]).toEqual([403, 'bad-token']);
  });

  it('refuses another origin even with the right token', async () => {
    const call = () => researcher.raw('post', '/presets').set('x-csrf-token', researcher.token);
    expect(
      (await call().set('origin', 'https://elsewhere.example').send({ document: sampleDocument() })).status,
    ).toBe(403);
    expect(
      (await call().set('sec-fetch-site', 'cross-site').send({ document: sampleDocument() })).status,
    ).toBe(403);
    expect(
      (await call().set('sec-fetch-site', 'same-origin').send({ document: sampleDocument() })).status,
    ).toBe(201);
  });

  it('believes a browser that says same origin, though a proxy changed the host', async () => {
    const answer = await researcher
      .raw('post', '/presets')
      .set('x-csrf-token', researcher.token)
      .set('sec-fetch-site', 'same-origin')
      .set('origin', 'http://localhost:5173')
      .send({ document: sampleDocument() });
    expect(answer.status).toBe(201);
  });
});

describe('bad input', () => {
  it.each([
    ['an array', []],
    ['nothing', {}],
    ['a document of the wrong type', { document: 'text' }],
    ['numbers as text', { document: { ...sampleDocument(), spread: '1' } }],
    ['a NUL character', { document: { ...sampleDocument(), notes: 'a\u0000b' } }],
    ['prototype keys', JSON.parse('{"document":{"__proto__":{"title":"x"},"constructor":1}}') as unknown],
    ['a formula that cannot be read', { document: { ...sampleDocument(), constantsOfMotion: ['x +* 2'] } }],
  ])('refuses %s with the fields in trouble', async (_name, body) => {
    const answer = await researcher.post('/presets', body);
    expect([answer.status, code(answer.body)]).toEqual([400, 'invalid']);
    const { fields, message } = (answer.body as { error: { fields: object; message: string } }).error;
    expect(Object.keys(fields).length > 0 || message.includes('NUL')).toBe(true);
  });

  it('keeps markup and control characters as plain text', async () => {
    const title = '<script>alert(1)</script> \u0007 {{x}} \u202e';
    const answer = await researcher.post('/presets', { document: sampleDocument(title) });
    expect(answer.status).toBe(201);
    expect((answer.body as { preset: { title: string } }).preset.title).toBe(title.trim());
    expect(answer.headers['content-type']).toMatch(/application\/json/);
  });

  it.each([
    ['a body nested beyond measure', `{"document":${'['.repeat(50_000)}${']'.repeat(50_000)}}`],
    ['a NUL deep inside', '{"document":{"processes":[{"template":{"settings":{"a":"x\\u0000"}}}]}}'],
    ['a number beyond the largest', '{"document":{"spread":1e999}}'],
    ['a key that reaches for the prototype', '{"document":{"__proto__":{"title":"x"}}}'],
  ])('refuses %s', async (_name, text) => {
    const answer = await researcher
      .raw('post', '/presets')
      .set('x-csrf-token', researcher.token)
      .set('content-type', 'application/json')
      .send(text);
    expect([answer.status, code(answer.body)]).toEqual([400, 'invalid']);
  });

  it('keeps text that only speaks of a NUL', async () => {
    const title = 'A written \\u0000 is six plain characters';
    const answer = await researcher.post('/presets', { document: sampleDocument(title) });
    expect((answer.body as { preset: { title: string } }).preset.title).toBe(title);
  });

  it('refuses a document beyond its limit that a request could still carry', async () => {
    const part = { symbol: 'x', name: 'x', hue: 'woad' };
    const intermediates = Array.from({ length: 60 }, (_one, k) => ({
      symbol: `a${k}`,
      formula: Array.from({ length: 900 }, () => 'x').join('+'),
      meaning: 'm'.repeat(500),
    }));
    const processes = Array.from({ length: 120 }, (_one, k) => ({
      id: `p${k}`,
      name: 'p',
      rate: Array.from({ length: 900 }, () => 'x').join('+'),
      effects: Array.from({ length: 4 }, () => ({
        class: 'x',
        amount: '('.repeat(20) + 'x'.padEnd(480) + ')'.repeat(20),
      })),
    }));
    const document = {
      ...sampleDocument(),
      populations: [{ ...part, classes: [{ symbol: 'x', name: 'x', start: 1 }] }],
      intermediates,
      processes,
    };
    const answer = await researcher.post('/presets', { document });
    expect([answer.status, code(answer.body)]).toEqual([413, 'too-large']);
  });

  it('refuses a body that is no JSON, and one that is too large', async () => {
    const call = () =>
      researcher
        .raw('post', '/presets')
        .set('x-csrf-token', researcher.token)
        .set('content-type', 'application/json');
    expect((await call().send('{"document":')).status).toBe(400);
    const large = await call().send(JSON.stringify({ document: { notes: 'x'.repeat(2_000_000) } }));
    expect([large.status, code(large.body)]).toEqual([413, 'too-large']);
  });

  it.each([
    '/presets?page=0',
    '/presets?page=NaN',
    '/presets?pageSize=100000',
    '/presets?sort=drop',
    '/presets?kind[]=x',
    '/presets?owner=%00',
    '/presets?tag=a%00b',
    '/presets?search=a&search=b',
  ])('refuses %s', async (path) => {
    const { status } = await researcher.get(path);
    expect(path.includes('[]') ? [200, 400] : [400]).toContain(status);
  });

  it.each(['%00', '..%2f..%2fsecret', 'a'.repeat(3000), "' OR 1=1 --", '%E0%A4%A'])(
    'answers the address /presets/%s without a fault',
    async (id) => {
      const { status } = await researcher.get(`/presets/${id}`);
      expect([400, 404]).toContain(status);
    },
  );

  it.each(['"', '*', 'NEAR(', 'a OR b', 'title:x', '--', '%', '_', '🦎'])(
    'searches for %j without a fault',
    async (text) => {
      const { status } = await researcher.get(`/presets?search=${encodeURIComponent(text)}`);
      expect(status).toBe(200);
    },
  );

  it('answers an unknown address of the interface in its envelope', async () => {
    const answer = await researcher.get('/nowhere');
    expect([answer.status, code(answer.body)]).toEqual([404, 'not-found']);
  });
});

describe('headers and cookies', () => {
  it('forbids eval and inline scripts, and everything from elsewhere', async () => {
    const { headers } = await new Visitor(server.app).raw('get', '/session');
    const policy = headers['content-security-policy'] ?? '';
    expect(policy).toContain("script-src 'self' 'wasm-unsafe-eval'");
    expect(policy).not.toContain("'unsafe-eval'");
    expect(/script-src[^;]*'unsafe-inline'/.test(policy)).toBe(false);
    expect(policy).toContain("default-src 'self'");
    expect(headers['x-content-type-options']).toBe('nosniff');
    expect(headers['x-powered-by']).toBeUndefined();
  });

  it('gives the session cookie to no script and to no other site', async () => {
    const visitor = new Visitor(server.app);
    const answer = await visitor.signIn('student@demo.invalid', 'springtails by sex');
    const cookies = ([] as string[]).concat(answer.headers['set-cookie'] ?? []);
    const session = cookies.find((one) => one.startsWith('moiety.session='));
    expect(session).toMatch(/HttpOnly/);
    expect(session).toMatch(/SameSite=Lax/);
  });

  it('makes no session for a visitor', async () => {
    const before = await server.database.models.SessionRecord.count();
    await new Visitor(server.app).session();
    expect(await server.database.models.SessionRecord.count()).toBe(before);
  });
});

describe('limits on attempts', () => {
  it('does not count sign-ins that succeed', async () => {
    const strict = await startTestServer({ limits: { windowMinutes: 15, signIn: 2, signUp: 3, mail: 2 } });
    const statuses: number[] = [];
    for (let k = 0; k < 4; k += 1) {
      const answer = await new Visitor(strict.app).signIn('student@demo.invalid', 'springtails by sex');
      statuses.push(answer.status);
    }
    expect(statuses).toEqual([200, 200, 200, 200]);
    await strict.close();
  });

  it('stops one place that tries many accounts, and mail to one address by either way', async () => {
    const strict = await startTestServer({ limits: { windowMinutes: 15, signIn: 1, signUp: 9, mail: 2 } });
    const visitor = new Visitor(strict.app);
    const tries: number[] = [];
    for (let k = 0; k < 11; k += 1) tries.push((await visitor.signIn(`a${k}@example.org`, 'wrong')).status);
    expect(tries.slice(0, 10)).toEqual(Array(10).fill(401));
    expect(tries[10]).toBe(429);
    const email = 'flooded@example.org';
    const sent = [
      await visitor.post('/accounts', { name: 'X', email, password: 'a long enough one' }),
      await visitor.post('/password/forgotten', { email }),
      await visitor.post('/accounts', { name: 'X', email, password: 'a long enough one' }),
    ];
    expect(sent.map(({ status }) => status)).toEqual([202, 202, 429]);
    await strict.close();
  });

  it('stops guessing after a few tries, for that account alone', async () => {
    const strict = await startTestServer({ limits: { windowMinutes: 15, signIn: 3, signUp: 3, mail: 2 } });
    const visitor = new Visitor(strict.app);
    const tries: number[] = [];
    for (let k = 0; k < 4; k += 1) tries.push((await visitor.signIn('student@demo.invalid', 'wrong')).status);
    expect(tries).toEqual([401, 401, 401, 429]);
    expect((await visitor.signIn('supervisor@demo.invalid', 'springtails by sex')).status).toBe(200);
    const mails: number[] = [];
    for (let k = 0; k < 3; k += 1)
      mails.push((await visitor.post('/password/forgotten', { email: 'a@example.org' })).status);
    expect(mails).toEqual([202, 202, 429]);
    await strict.close();
  });
});
