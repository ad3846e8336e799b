import type { RequestListener, ServerResponse } from 'node:http';
import { setTimeout as pause } from 'node:timers/promises';

import type { ErrorBody } from '@/contract/errors';

const STARTING = 'The server is starting: its database is being prepared. Try again in a moment.';
const STOPPING = 'The server is about to stop. Try again in a moment.';
/** Nothing under way for so long, in milliseconds, means that nothing more is on its way. */
const QUIET = 200;
const STEP = 20;

/**
 * Stands between the port and the application: answers from the first moment of the process, says why nothing is
 * served while the database is made ready, and knows what is under way when the server is asked to stop.
 */
export class FrontDoor {
  private stopping = false;
  private application: RequestListener | null = null;
  private readonly underWay = new Set<ServerResponse>();

  open(application: RequestListener): void {
    this.application = application;
  }

  /** Says that it is about to stop; settles when all that came in is answered, or after `patience` milliseconds. */
  async close(patience: number): Promise<void> {
    this.stopping = true;
    for (const response of this.underWay) lastOfItsConnection(response);
    const end = Date.now() + patience;
    for (let quiet = 0; quiet < QUIET && Date.now() < end;) {
      await pause(STEP);
      quiet = this.underWay.size === 0 ? quiet + STEP : 0;
    }
  }

  readonly handle: RequestListener = (request, response) => {
    if (this.stopping) lastOfItsConnection(response);
    if (this.application === null) {
      if (request.url === '/api/health') answer(response, 200, { alive: true });
      else refuse(response, this.stopping ? STOPPING : STARTING);
      return;
    }
    if (this.stopping && request.url === '/api/ready') return refuse(response, STOPPING);
    this.underWay.add(response);
    response.once('close', () => this.underWay.delete(response));
    this.application(request, response);
  };
}

function lastOfItsConnection(response: ServerResponse): void {
  if (!response.headersSent) response.setHeader('connection', 'close');
}

function refuse(response: ServerResponse, message: string): void {
  const body: ErrorBody = { error: { code: 'unavailable', message } };
  response.setHeader('retry-after', '2');
  answer(response, 503, body);
}

function answer(response: ServerResponse, status: number, body: object): void {
  response.writeHead(status, {
    'content-type': 'application/json; charset=utf-8',
    'cache-control': 'no-store',
    'x-content-type-options': 'nosniff',
  });
  response.end(JSON.stringify(body));
}
