import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

import { expect, it } from 'vitest';

import type { SessionBody } from '@/contract/account';
import type { PresetBody } from '@/contract/presets';

import { Database } from '../../server/models/database';
import { DEMO_PEOPLE } from '../../server/seeds/demo';
import { sampleDocument } from '../support/test-server';

const SAVES = 200;
const KILLS = 3;
const AT_ONCE = 8;
const PORT = 4304;
const API = `http://127.0.0.1:${PORT}/api`;

async function startServer(folder: string): Promise<ChildProcess> {
  const child = spawn(process.execPath, ['--import', 'tsx', 'server/main.ts'], {
    env: { ...process.env, DATA_DIR: folder, DEMO: '1', PORT: String(PORT), LOG_LEVEL: 'silent' },
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  await Promise.race([
    once(child.stdout, 'data'),
    once(child, 'exit').then(() => Promise.reject(new Error('the server ended before it listened'))),
  ]);
  return child;
}

/** Signs in and returns a function that saves a preset of a title; it fails unless the save was acknowledged. */
async function signIn(): Promise<(title: string) => Promise<string>> {
  const jar = new Map<string, string>();
  const call = async (method: string, path: string, body?: unknown, token = '') => {
    const cookie = [...jar].map(([name, value]) => `${name}=${value}`).join('; ');
    const answer = await fetch(`${API}${path}`, {
      method,
      headers: { 'content-type': 'application/json', 'x-csrf-token': token, cookie },
      ...(body === undefined ? {} : { body: JSON.stringify(body) }),
    });
    for (const line of answer.headers.getSetCookie()) {
      const [name = '', value = ''] = (line.split(';')[0] ?? '').split(/=(.*)/s);
      jar.set(name, value);
    }
    if (!answer.ok) throw new Error(`${method} ${path}: ${answer.status}`);
    return answer.json() as Promise<unknown>;
  };
  const { csrfToken } = (await call('GET', '/session')) as SessionBody;
  const { email, password } = DEMO_PEOPLE.find(({ role }) => role === 'researcher') ?? {};
  const session = (await call('POST', '/session', { email, password }, csrfToken)) as SessionBody;
  return async (title) => {
    const document = sampleDocument(title);
    const made = (await call('POST', '/presets', { document }, session.csrfToken)) as PresetBody;
    return made.preset.id;
  };
}

it('loses no acknowledged save when killed at random moments, and stays sound', async () => {
  const folder = mkdtempSync(join(tmpdir(), 'moiety-durability-'));
  const acknowledged: string[] = [];
  let child: ChildProcess | null = null;
  try {
    for (let life = 0; life <= KILLS; life += 1) {
      child = await startServer(folder);
      const save = await signIn();
      // The last life makes the rest without a kill.
      const killAt = acknowledged.length + 20 + Math.floor(Math.random() * 30);
      let alive = true;
      const saveOn = async () => {
        while (alive && acknowledged.length < SAVES) {
          try {
            acknowledged.push(await save(`Save ${acknowledged.length}`));
          } catch (error) {
            if (alive) throw error;
          }
          if (life < KILLS && acknowledged.length >= killAt && alive) {
            alive = false;
            child?.kill('SIGKILL');
          }
        }
      };
      const exit = once(child, 'exit');
      await Promise.all(Array.from({ length: AT_ONCE }, saveOn));
      if (life === KILLS) child.kill('SIGKILL');
      await exit;
    }
    const database = new Database(join(folder, 'moiety.sqlite'));
    const [checked] = await database.sequelize.query('PRAGMA integrity_check');
    const presets = await database.models.Preset.findAll({ attributes: ['id'] });
    const versions = await database.models.PresetVersion.findAll({ attributes: ['presetId'] });
    await database.close();
    expect(checked).toEqual([{ integrity_check: 'ok' }]);
    expect(acknowledged.length).toBeGreaterThanOrEqual(SAVES);
    const kept = new Set(presets.map(({ id }) => id));
    const withVersion = new Set(versions.map(({ presetId }) => presetId));
    expect(acknowledged.filter((id) => !kept.has(id) || !withVersion.has(id))).toEqual([]);
    expect([...kept].filter((id) => !withVersion.has(id))).toEqual([]);
  } finally {
    child?.kill('SIGKILL');
    rmSync(folder, { recursive: true, force: true });
  }
}, 90_000);
