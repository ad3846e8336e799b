import type { ChildProcess } from 'node:child_process';
import { randomUUID } from 'node:crypto';
import { once } from 'node:events';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

import { expect, it } from 'vitest';

import type { AssignedPage, Receipt, Task } from '@/contract/assigned-sweeps';
import type { PresetBody } from '@/contract/presets';

import { Database } from '../../server/models/database';
import { freePort, isReady, signInTo, spawnServer } from '../support/server-process';
import { sampleDocument } from '../support/test-server';

/** Saves and hand-ins together, half of each. */
const WRITES = 200;
const KILLS = 3;
const AT_ONCE = 8;

/** Functions that save a preset and hand in a sweep; each fails unless what it wrote was acknowledged. */
async function writers(port: number) {
  const researcher = await signInTo(port, 'researcher');
  const student = await signInTo(port, 'student');
  const mine = (await student('GET', '/assigned')) as AssignedPage;
  const id = mine.items[0]?.id ?? '';
  const { document, range } = (await student('GET', `/assigned/${id}/task`)) as Task;
  return {
    save: async (title: string) => {
      const made = (await researcher('POST', '/presets', { document: sampleDocument(title) })) as PresetBody;
      return made.preset.id;
    },
    handIn: async (note: string) => {
      const body = { key: randomUUID(), document, range, findings: [], sweep: null, note };
      return ((await student('POST', `/assigned/${id}/hand-ins`, body)) as Receipt).id;
    },
  };
}

it('loses no acknowledged save or hand-in when killed at random moments, and stays sound', async () => {
  const folder = mkdtempSync(join(tmpdir(), 'moiety-durability-'));
  const port = await freePort();
  const saved: string[] = [];
  const handedIn: string[] = [];
  const count = () => saved.length + handedIn.length;
  let child: ChildProcess | null = null;
  try {
    for (let life = 0; life <= KILLS; life += 1) {
      child = spawnServer(folder, port);
      await isReady(child);
      const { save, handIn } = await writers(port);
      // The last life makes the rest without a kill.
      const killAt = count() + 20 + Math.floor(Math.random() * 30);
      let alive = true;
      const writeOn = async (_: unknown, lane: number) => {
        while (alive && count() < WRITES) {
          try {
            if (lane % 2 === 0) saved.push(await save(`Save ${saved.length}`));
            else handedIn.push(await handIn(`Hand-in ${handedIn.length}`));
          } catch (error) {
            if (alive) throw error;
          }
          if (life < KILLS && count() >= killAt && alive) {
            alive = false;
            child?.kill('SIGKILL');
          }
        }
      };
      const exit = once(child, 'exit');
      await Promise.all(Array.from({ length: AT_ONCE }, writeOn));
      if (life === KILLS) child.kill('SIGKILL');
      await exit;
    }
    const database = new Database(join(folder, 'moiety.sqlite'));
    const presets = await database.models.Preset.count({ where: { id: saved } });
    const versions = await database.models.PresetVersion.count({ where: { presetId: saved } });
    const handIns = await database.models.HandIn.count({ where: { id: handedIn } });
    const [[check]] = (await database.sequelize.query('PRAGMA integrity_check')) as [
      { integrity_check: string }[],
      unknown,
    ];
    const [strays] = await database.sequelize.query('PRAGMA foreign_key_check');
    await database.close();
    expect(count()).toBeGreaterThanOrEqual(WRITES);
    expect(Math.min(saved.length, handedIn.length)).toBeGreaterThan(20);
    expect(presets).toBe(saved.length);
    expect(versions).toBe(saved.length);
    expect(handIns).toBe(handedIn.length);
    expect(check?.integrity_check).toBe('ok');
    expect(strays).toEqual([]);
  } finally {
    child?.kill('SIGKILL');
    rmSync(folder, { recursive: true, force: true });
  }
}, 180_000);
