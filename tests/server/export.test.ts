import { strFromU8, unzipSync } from 'fflate';
import type { Response } from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import { presetSchema } from '@/engine/schema/preset';
import type { PresetBody } from '@/contract/presets';

import { fileName } from '../../server/export/zip-stream';
import { DEMO_LAB } from '../../server/seeds/demo';
import { sampleDocument, startTestServer, type TestServer, type Visitor } from '../support/test-server';

let server: TestServer;
beforeAll(async () => {
  server = await startTestServer();
});
afterAll(() => server.close());

/** The files of an archive by name. */
async function archive(visitor: Visitor, path: string): Promise<Map<string, string>> {
  const answer: Response = await visitor
    .raw('get', path)
    .buffer(true)
    .parse((response, done) => {
      const pieces: Buffer[] = [];
      response.on('data', (piece: Buffer) => pieces.push(piece));
      response.on('end', () => done(null, Buffer.concat(pieces)));
    });
  expect(answer.status).toBe(200);
  expect(answer.headers['content-type']).toBe('application/zip');
  expect(answer.headers['content-disposition']).toMatch(/attachment; filename="?moiety-[\w-]+\.zip"?$/);
  const files = unzipSync(new Uint8Array(answer.body as Buffer));
  return new Map(Object.entries(files).map(([name, bytes]) => [name, strFromU8(bytes)]));
}

describe('an export', () => {
  it('of one’s own holds every version, readable again, and nobody else’s', async () => {
    const researcher = await server.person('researcher');
    const made = (await researcher.post('/presets', { document: sampleDocument('../Newts & “frogs”') }))
      .body as PresetBody;
    await researcher.post(`/presets/${made.preset.id}/versions`, {
      document: sampleDocument('Newts again'),
      note: 'second',
      baseVersion: 1,
    });
    const link = (await researcher.post(`/presets/${made.preset.id}/links`, { label: 'a colleague' }))
      .body as {
      token: string;
    };
    const files = await archive(researcher, '/account/export.zip');
    const names = [...files.keys()];
    expect(names.every((name) => /^[A-Za-z0-9][\w./-]*$/.test(name) && !name.includes('..'))).toBe(true);
    const versions = names.filter((name) => name.includes('Newts-again') && name.endsWith('.moiety.json'));
    expect(versions).toHaveLength(2);
    const titles = versions.map((name) => presetSchema.parse(JSON.parse(files.get(name) ?? '')).title);
    expect(titles.sort()).toEqual(['../Newts & “frogs”', 'Newts again']);
    const all = [...files.values()].join('\n');
    expect(all).toContain('a colleague');
    for (const secret of [link.token, 'passwordHash', 'tokenHash', '$argon2', 'supervisor@demo.invalid'])
      expect(all).not.toContain(secret);
    expect(JSON.parse(files.get('account.json') ?? '')).toMatchObject({ email: 'researcher@demo.invalid' });
    expect(files.get('README.txt')).toContain('What is yours');
  });

  it('of a student holds no answer to what is set for them', async () => {
    const files = await archive(await server.person('student'), '/account/export.zip');
    const sweep = [...files.keys()].find((name) => name.endsWith('/sweep.json')) ?? '';
    expect(JSON.parse(files.get(sweep) ?? '')).toMatchObject({ mine: 'untouched' });
    const all = [...files.values()].join('\n');
    expect(all).not.toContain('"reference"');
    expect(all).not.toMatch(/"knownFacts": \[\s*\{/);
  });

  it('of a lab holds presets, sweeps with reference and history, and is in the history itself', async () => {
    const supervisor = await server.person('supervisor');
    await supervisor.post(`/labs/${DEMO_LAB.id}/invitations`, {
      invitations: [{ email: 'outsider@elsewhere.example', role: 'student' }],
    });
    const files = await archive(supervisor, `/labs/${DEMO_LAB.id}/export.zip`);
    const names = [...files.keys()];
    const lab = JSON.parse(files.get('lab.json') ?? '') as { members: { name: string }[] };
    expect(lab.members.map(({ name }) => name)).toContain('Sanna Weldon');
    expect(
      names.filter((name) => /^presets\/.*\/version-1\.moiety\.json$/.test(name)).length,
    ).toBeGreaterThanOrEqual(2);
    const sweep = names.find((name) => name.startsWith('assigned-sweeps/')) ?? '';
    expect(files.get(sweep)).toContain('"reference"');
    expect(files.get('history.csv')).toContain('lab exported');
    expect(files.get('history.csv')).toContain('member invited');
    const all = [...files.values()].join('\n');
    for (const secret of ['@demo.invalid', '@elsewhere.example', 'tokenHash', '$argon2'])
      expect(all).not.toContain(secret);
  });

  it.each([
    ['../../etc/passwd', 'etc-passwd'],
    ['CON: a*b?', 'CON-a-b'],
    ['Räuber & Beute', 'Rauber-Beute'],
    ['\u202e', 'untitled'],
    ['x'.repeat(200), 'x'.repeat(60)],
  ])('names a file after “%s”', (words, name) => {
    expect(fileName(words)).toBe(name);
  });
});
