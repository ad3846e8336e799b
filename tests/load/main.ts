/**
 * `npm run load`: how fast the built server answers with 50 requests in flight, on a data folder of its own that
 * `seed:load` has filled, or on the one named by LOAD_DIR. A target missed is told, not an error: machines differ.
 */
import { spawn, spawnSync, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

import type { AssignedPage } from '@/contract/assigned-sweeps';
import type { SessionBody } from '@/contract/account';
import type { PresetBody, PresetPage } from '@/contract/presets';

import { drawFrom, type Draw } from '../../server/seeds/load/random';
import { LOAD_PASSWORD } from '../../server/seeds/load/seed-load';
import { hardwareLine } from '../bench/hardware';
import { freePort } from '../support/server-process';
import { Client } from './client';
import { reportLine } from './report';
import { VISITS, type Visit, type Visitor } from './visits';

const IN_FLIGHT = 50;
const WARM_UP = 3_000;
const LASTS = 20_000;

function seededFolder(): string {
  const named = process.env.LOAD_DIR;
  if (named !== undefined) return named;
  const folder = mkdtempSync(join(tmpdir(), 'moiety-load-'));
  const env = { ...process.env, DATA_DIR: folder };
  const seeded = spawnSync(process.execPath, ['--import', 'tsx', 'server/seeds/load/main.ts'], {
    env,
    stdio: 'inherit',
  });
  if (seeded.status !== 0) throw new Error('The data folder could not be filled.');
  return folder;
}

async function startServer(folder: string, port: number): Promise<ChildProcess> {
  const server = spawn(process.execPath, ['dist/server/main.js'], {
    // The limits of the demo let fifty people of one place sign in.
    env: { ...process.env, DATA_DIR: folder, PORT: String(port), DEMO: '1', LOG_LEVEL: 'warn' },
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  if (!server.stdout) throw new Error('The server has no output.');
  await once(server.stdout, 'data');
  return server;
}

/** Ticks of a hundredth of a second in which Linux ran a process; null elsewhere. */
function ticksOf({ pid }: ChildProcess): number | null {
  try {
    // Behind the name in parentheses: state, then eleven numbers, then user and system time.
    const fields = readFileSync(`/proc/${pid}/stat`, 'utf8').split(') ')[1]?.split(' ') ?? [];
    return Number(fields[11]) + Number(fields[12]);
  } catch {
    return null;
  }
}

/** Every third is a supervisor; the others are anyone. */
async function arrive(port: number, k: number): Promise<Visitor> {
  const client = new Client(port);
  await client.signIn(`person-${k % 3 === 0 ? k : 200 + k * 31}@load.invalid`, LOAD_PASSWORD);
  const read = async <Body>(path: string) => JSON.parse((await client.send('GET', path)).body) as Body;
  const { user } = await read<SessionBody>('/session');
  const [membership] = user?.memberships ?? [];
  if (membership === undefined) throw new Error('This person is in no lab.');
  const { labId } = membership;
  const { items } = await read<PresetPage>('/presets?pageSize=60');
  const own = (await read<PresetPage>('/presets?kind=own&pageSize=1')).items[0];
  const sweeps = (await read<AssignedPage>(`/labs/${labId}/assigned`)).items.map(({ id }) => id);
  return {
    client,
    labId,
    supervises: membership.role === 'supervisor',
    presets: items.map(({ id }) => id),
    sweeps,
    own: own ? await read<PresetBody>(`/presets/${own.id}`) : null,
  };
}

function chooseVisit(draw: Draw): Visit {
  let left = draw() * VISITS.reduce((sum, { weight }) => sum + weight, 0);
  for (const visit of VISITS) {
    left -= visit.weight;
    if (left < 0) return visit;
  }
  throw new Error('There is no visit to choose.');
}

async function measure(
  visitors: readonly Visitor[],
): Promise<{ times: Map<Visit, number[]>; answers: number }> {
  let answers = 0;
  const times = new Map<Visit, number[]>(VISITS.map((visit) => [visit, []]));
  const began = performance.now();
  await Promise.all(
    visitors.map(async (visitor, k) => {
      const draw = drawFrom(k + 1);
      for (let now = 0; now < WARM_UP + LASTS; now = performance.now() - began) {
        const visit = chooseVisit(draw);
        const answer = await visit.go(visitor, draw);
        if (answer.status >= 400) throw new Error(`${visit.name}: ${answer.status} ${answer.body}`);
        answers += 1;
        if (now > WARM_UP) times.get(visit)?.push(answer.milliseconds);
      }
    }),
  );
  return { times, answers };
}

if (!existsSync('dist/server/main.js')) throw new Error('Build first: npm run build.');
const folder = seededFolder();
const port = await freePort();
const server = await startServer(folder, port);
try {
  const visitors: Visitor[] = [];
  for (let k = 0; k < IN_FLIGHT; k += 1) visitors.push(await arrive(port, k));
  const before = ticksOf(server);
  const { times, answers } = await measure(visitors);
  const after = ticksOf(server);
  const all = [...times.values()].reduce((sum, one) => sum + one.length, 0);
  console.log(hardwareLine());
  console.log(`${IN_FLIGHT} requests in flight, ${Math.round((all * 1000) / LASTS)} answers a second.`);
  if (before !== null && after !== null)
    console.log(
      `The server used ${(((after - before) * 10) / answers).toFixed(2)} ms of a processor an answer.`,
    );
  console.log(`  ${'route'.padEnd(34)}${'count'.padStart(6)}     median  99th percentile`);
  for (const [visit, taken] of times) console.log(reportLine(visit, taken));
} finally {
  const ended = once(server, 'exit');
  server.kill('SIGTERM');
  await ended;
  if (process.env.LOAD_DIR === undefined) rmSync(folder, { recursive: true, force: true });
}
