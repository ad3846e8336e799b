import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { createServer } from 'node:net';

import type { SessionBody } from '@/contract/account';
import type { Role } from '@/contract/rights';

import { DEMO_PEOPLE } from '../../server/seeds/demo';

/** A port that nobody listened on a moment ago. */
export async function freePort(): Promise<number> {
  const server = createServer().listen(0, '127.0.0.1');
  await once(server, 'listening');
  const address = server.address();
  server.close();
  await once(server, 'close');
  if (address === null || typeof address === 'string') throw new Error('no port');
  return address.port;
}

/** The server as a process of its own, on a data folder and a port; it may not be ready yet. */
export function spawnServer(folder: string, port: number, logLevel = 'silent'): ChildProcess {
  return spawn(process.execPath, ['--import', 'tsx', 'server/main.ts'], {
    env: { ...process.env, DATA_DIR: folder, DEMO: '1', PORT: String(port), LOG_LEVEL: logLevel },
    stdio: ['ignore', 'pipe', 'inherit'],
  });
}

/** Waits until a server says where it is. */
export async function isReady(child: ChildProcess): Promise<void> {
  if (!child.stdout) throw new Error('the server has no output');
  await Promise.race([
    once(child.stdout, 'data'),
    once(child, 'exit').then(() => Promise.reject(new Error('the server ended before it was ready'))),
  ]);
}

/** Calls a server as one signed-in person of the demo; a refusal is an error. */
export async function signInTo(port: number, role: Role) {
  const jar = new Map<string, string>();
  let token = '';
  const call = async (method: string, path: string, body?: unknown): Promise<unknown> => {
    const cookie = [...jar].map(([name, value]) => `${name}=${value}`).join('; ');
    const answer = await fetch(`http://127.0.0.1:${port}/api${path}`, {
      method,
      headers: { 'content-type': 'application/json', 'x-csrf-token': token, cookie },
      ...(body === undefined ? {} : { body: JSON.stringify(body) }),
    });
    for (const line of answer.headers.getSetCookie()) {
      const [name = '', value = ''] = (line.split(';')[0] ?? '').split(/=(.*)/s);
      jar.set(name, value);
    }
    const read: unknown = await answer.json();
    if (!answer.ok) throw new Error(`${method} ${path}: ${answer.status} ${JSON.stringify(read)}`);
    return read;
  };
  token = ((await call('GET', '/session')) as SessionBody).csrfToken;
  const { email, password } = DEMO_PEOPLE.find((one) => one.role === role) ?? {};
  token = ((await call('POST', '/session', { email, password })) as SessionBody).csrfToken;
  return call;
}
