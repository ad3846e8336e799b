import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';

import { afterEach, beforeEach, expect, it } from 'vitest';

import { FrontDoor } from '../../server/front-door';

let door: FrontDoor;
let server: Server;
beforeEach(async () => {
  door = new FrontDoor();
  server = createServer(door.handle);
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
});
afterEach(() => {
  server.closeAllConnections();
  server.close();
});

const ask = async (path: string) => {
  const answer = await fetch(`http://127.0.0.1:${(server.address() as AddressInfo).port}${path}`);
  return { status: answer.status, text: await answer.text(), connection: answer.headers.get('connection') };
};

it('is alive before it is open, and says in words why nothing else is served', async () => {
  expect(await ask('/api/health')).toMatchObject({ status: 200, text: '{"alive":true}' });
  for (const path of ['/api/ready', '/api/session', '/']) {
    const { status, text } = await ask(path);
    expect([path, status]).toEqual([path, 503]);
    expect(JSON.parse(text)).toMatchObject({
      error: {
        code: 'unavailable',
        message: expect.stringContaining('database is being prepared') as string,
      },
    });
  }
});

it('finishes what is under way when it closes, answers what still comes in, and is ready no more', async () => {
  let finish = () => undefined as void;
  const begun = new Promise<void>((begin) => {
    door.open((request, response) => {
      if (request.url !== '/slow') return void response.end('quick');
      finish = () => void response.end('slow');
      begin();
    });
  });
  expect((await ask('/api/ready')).text).toBe('quick');
  const slow = ask('/slow');
  await begun;
  let closed = false;
  const closing = door.close(10_000).then(() => {
    closed = true;
  });
  expect((await ask('/api/ready')).status).toBe(503);
  expect(await ask('/other')).toMatchObject({ status: 200, connection: 'close' });
  expect(closed).toBe(false);
  finish();
  expect(await slow).toMatchObject({ text: 'slow', connection: 'close' });
  await closing;
});

it('waits no longer than it is told to', async () => {
  const begun = new Promise<void>((begin) => door.open(() => begin()));
  const hanging = ask('/hangs').catch(() => 'cut off');
  await begun;
  const from = Date.now();
  await door.close(100);
  expect(Date.now() - from).toBeLessThan(1000);
  server.closeAllConnections();
  expect(await hanging).toBe('cut off');
});
