import { once } from 'node:events';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

import { afterEach, beforeEach, describe, expect, it } from 'vitest';

import type { PresetBody } from '@/contract/presets';

import { Database } from '../../server/models/database';
import { freePort, isReady, signInTo, spawnServer } from '../support/server-process';
import { sampleDocument, startTestServer, Visitor } from '../support/test-server';

let folder = '';
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'moiety-running-'));
});
afterEach(() => rmSync(folder, { recursive: true, force: true }));

interface Answer {
  readonly status: number;
  readonly body: { error?: { code: string; message: string } };
}

async function ask(port: number, path: string): Promise<Answer | null> {
  try {
    const answer = await fetch(`http://127.0.0.1:${port}/api${path}`);
    return { status: answer.status, body: (await answer.json()) as Answer['body'] };
  } catch {
    return null;
  }
}

describe('the server as a process', () => {
  it('is alive from the first moment, and ready when its database is', { timeout: 60_000 }, async () => {
    const port = await freePort();
    const child = spawnServer(folder, port);
    const seen: string[] = [];
    for (;;) {
      const [health, ready, route] = [
        await ask(port, '/health'),
        await ask(port, '/ready'),
        await ask(port, '/session'),
      ];
      if (!health || !ready || !route) continue;
      expect(health.status).toBe(200);
      seen.push(`${ready.status}`);
      if (ready.status === 200) break;
      expect(ready.body.error?.code).toBe('unavailable');
      expect(ready.body.error?.message).toContain('database is being prepared');
    }
    expect(seen[0]).toBe('503');
    expect((await ask(port, '/session'))?.status).toBe(200);
    const exit = once(child, 'exit');
    child.kill('SIGTERM');
    expect((await exit)[0]).toBe(0);
  });

  it(
    'stopped while it prepares its database, ends soundly and begins again',
    { timeout: 60_000 },
    async () => {
      const port = await freePort();
      const child = spawnServer(folder, port);
      while ((await ask(port, '/health')) === null);
      const exit = once(child, 'exit');
      child.kill('SIGTERM');
      expect((await exit)[0]).toBe(0);
      const next = spawnServer(folder, port);
      await isReady(next);
      expect((await ask(port, '/ready'))?.status).toBe(200);
      const ended = once(next, 'exit');
      next.kill('SIGINT');
      expect((await ended)[0]).toBe(0);
    },
  );

  it('asked to stop, finishes what it accepted and ends by itself', { timeout: 60_000 }, async () => {
    const port = await freePort();
    const child = spawnServer(folder, port);
    await isReady(child);
    const call = await signInTo(port, 'researcher');
    const exit = once(child, 'exit');
    const began = Date.now();
    const saves = Array.from({ length: 40 }, async (_, k) => {
      const made = (await call('POST', '/presets', { document: sampleDocument(`Save ${k}`) })) as PresetBody;
      return made.preset.id;
    });
    // Once the first is through, the others are under way.
    await Promise.race(saves);
    child.kill('SIGTERM');
    const settled = await Promise.allSettled(saves);
    const [code] = (await exit) as [number | null];
    expect(code).toBe(0);
    expect(Date.now() - began).toBeLessThan(15_000);
    const acknowledged = settled.flatMap((one) => (one.status === 'fulfilled' ? [one.value] : []));
    // A connection that was never accepted may be refused; an answer is never one of the server's faults.
    for (const one of settled)
      if (one.status === 'rejected') expect(String(one.reason)).not.toMatch(/: 5\d\d/);
    expect(acknowledged.length).toBeGreaterThan(0);
    const database = new Database(join(folder, 'moiety.sqlite'));
    const kept = await database.models.Preset.count({ where: { id: acknowledged } });
    const [[check]] = (await database.sequelize.query('PRAGMA integrity_check')) as [
      { integrity_check: string }[],
      unknown,
    ];
    await database.close();
    expect(kept).toBe(acknowledged.length);
    expect(check?.integrity_check).toBe('ok');
  });
});

describe('logs', () => {
  it('are lines of JSON that hold no secret of a whole tour', async () => {
    const lines: string[] = [];
    const server = await startTestServer({ log: { write: (line: string) => void lines.push(line) } });
    const secrets = new Set<string>([server.dependencies.settings.sessionSecret]);
    const remember = (secret: string | undefined) => {
      if (!secret) throw new Error('the tour has lost a secret on its way');
      secrets.add(secret);
    };
    const newestToken = async (page: string) => {
      await server.mailArrived();
      const mail = (await server.mailbox.list()).find(({ text }) => text.includes(`/${page}?token=`));
      const token = new RegExp(`/${page}\\?token=([\\w.-]+)`).exec(mail?.text ?? '')?.[1];
      remember(token);
      return token ?? '';
    };
    try {
      const someone = new Visitor(server.app);
      const account = { name: 'Nia Marsh', email: 'nia@example.org', password: 'frogs in the fen' };
      remember(account.password);
      await someone.post('/accounts', account);
      await someone.post('/accounts/confirm', { token: await newestToken('confirm') });
      remember(someone.token);
      await someone.post('/session', { email: account.email, password: 'a wrong password' });
      secrets.add('a wrong password');
      await someone.post('/password/forgotten', { email: account.email });
      const reset = await newestToken('reset');
      await someone.post('/password/reset', { token: reset, password: 'newts in the pond' });
      secrets.add('newts in the pond');
      const signedIn = await someone.signIn(account.email, 'newts in the pond');
      for (const cookie of signedIn.headers['set-cookie'] ?? [])
        remember(/=([^;]{20,})/.exec(String(cookie))?.[1]);

      const supervisor = await server.person('supervisor');
      await supervisor.post('/labs/demo-lab/invitations', {
        invitations: [{ email: 'nia@example.org', role: 'student' }],
      });
      await someone.get(`/invitations/${await newestToken('join')}`);
      const made = await supervisor.post('/presets', { document: sampleDocument() });
      const { preset } = made.body as PresetBody;
      const link = await supervisor.post(`/presets/${preset.id}/links`, { label: 'for a colleague' });
      const { token } = link.body as { token: string };
      remember(token);
      await new Visitor(server.app).get(`/shared/${token}`);
      await someone.get(`/mail/subscription?token=${'x'.repeat(30)}-stop-token`);
      secrets.add(`${'x'.repeat(30)}-stop-token`);
      await someone.raw('post', '/presets').set('cookie', 'moiety=s%3Aforged-session-value').send('{"broken');
      secrets.add('forged-session-value');
    } finally {
      await server.close();
    }
    expect(lines.length).toBeGreaterThan(15);
    for (const line of lines) expect(() => JSON.parse(line) as unknown).not.toThrow();
    const log = lines.join('');
    expect(log).toContain('/api/shared/');
    expect([...secrets].filter((secret) => log.includes(secret))).toEqual([]);
  });
});
