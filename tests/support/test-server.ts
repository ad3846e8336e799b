import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

import type { Express } from 'express';
import type { DestinationStream } from 'pino';
import request, { type Response } from 'supertest';

import type { SessionBody } from '@/contract/account';
import type { Role } from '@/contract/rights';
import { createPreset } from '@/engine/schema/create';
import type { PresetDocument } from '@/engine/schema/preset';

import { createApp } from '../../server/app';
import type { Dependencies } from '../../server/dependencies';
import { createLogger } from '../../server/logger';
import { startLocalSmtp, type LocalSmtp } from '../../server/mail/local-smtp';
import { Mailbox } from '../../server/mail/mailbox';
import { Mailer } from '../../server/mail/mailer';
import { createRateLimits, type RateLimitSettings } from '../../server/middleware/rate-limits';
import { createMigrator } from '../../server/migrations';
import { Database } from '../../server/models/database';
import { Passwords } from '../../server/passwords';
import { DEMO_PEOPLE, seedDemo } from '../../server/seeds/demo';
import { seedStarters } from '../../server/seeds/starters';

const MANY: RateLimitSettings = { windowMinutes: 15, signIn: 10_000, signUp: 10_000, mail: 10_000 };
/** The cheapest argon2 setting: tests are about the flow, not about the cost. */
const CHEAP = { memoryCost: 64, timeCost: 1, parallelism: 1 };

/** A browser: keeps its cookies and its token. */
export class Visitor {
  private readonly agent;
  token = '';

  constructor(readonly app: Express) {
    this.agent = request.agent(app);
  }

  async session(): Promise<SessionBody> {
    const answer = await this.agent.get('/api/session');
    const body = answer.body as SessionBody;
    this.token = body.csrfToken;
    return body;
  }

  get(path: string): Promise<Response> {
    return this.agent.get(`/api${path}`).then((answer) => answer);
  }

  async send(method: 'post' | 'patch' | 'delete' | 'put', path: string, body?: unknown): Promise<Response> {
    if (this.token === '') await this.session();
    const call = this.agent[method](`/api${path}`).set('x-csrf-token', this.token);
    const answer = await (body === undefined ? call : call.send(body as object));
    const fresh = (answer.body as Partial<SessionBody> | undefined)?.csrfToken;
    if (typeof fresh === 'string') this.token = fresh;
    return answer;
  }

  post(path: string, body: unknown = {}): Promise<Response> {
    return this.send('post', path, body);
  }

  /** A request as it stands, for refusals. */
  raw(method: 'get' | 'post' | 'patch' | 'delete' | 'put', path: string) {
    return this.agent[method](`/api${path}`);
  }

  async signIn(email: string, password: string): Promise<Response> {
    const answer = await this.post('/session', { email, password });
    return answer;
  }
}

export interface TestServer {
  readonly app: Express;
  readonly database: Database;
  readonly mailbox: Mailbox;
  readonly folder: string;
  readonly dependencies: Dependencies;
  /** Waits until mail on its way has arrived. */
  mailArrived(): Promise<void>;
  /** Someone of the demo lab, signed in. */
  person(role: Role): Promise<Visitor>;
  close(): Promise<void>;
}

export async function startTestServer(
  options: { limits?: RateLimitSettings; demo?: boolean; log?: DestinationStream } = {},
): Promise<TestServer> {
  const folder = mkdtempSync(join(tmpdir(), 'moiety-test-'));
  const logger = options.log ? createLogger('trace', options.log) : createLogger('silent');
  const database = new Database(join(folder, 'moiety.sqlite'));
  await createMigrator(database).up();
  await seedStarters(database);
  const mailbox = new Mailbox(join(folder, 'mail'));
  const smtp: LocalSmtp = await startLocalSmtp(mailbox, logger);
  const secret = 'a secret that only tests know, long enough';
  const publicUrl = 'http://moiety.test';
  const mailer = new Mailer(
    database,
    { smtpUrl: smtp.url, from: 'Moiety <moiety@example.org>', publicUrl, secret },
    logger,
  );
  const demo = options.demo ?? true;
  const dependencies: Dependencies = {
    settings: {
      publicUrl,
      sessionSecret: secret,
      secureCookies: false,
      trustProxy: 0,
      demo,
      clientFolder: null,
    },
    database,
    mailer,
    mailbox,
    passwords: new Passwords(CHEAP),
    limits: createRateLimits(options.limits ?? MANY),
    logger,
  };
  if (demo) await seedDemo(dependencies);
  const app = createApp(dependencies);
  return {
    app,
    database,
    mailbox,
    folder,
    dependencies,
    mailArrived: () => mailer.idle(),
    person: async (role) => {
      const who = DEMO_PEOPLE.find((one) => one.role === role);
      const visitor = new Visitor(app);
      const answer = await visitor.signIn(who?.email ?? '', who?.password ?? '');
      if (answer.status !== 200) throw new Error(`${role} could not sign in`);
      return visitor;
    },
    close: async () => {
      await mailer.stop();
      await smtp.close();
      await database.close();
      rmSync(folder, { recursive: true, force: true });
    },
  };
}

/** A small valid document. */
export function sampleDocument(title = 'Newts in a pond'): PresetDocument {
  return createPreset({
    title,
    tags: ['pond'],
    populations: [
      { symbol: 'x', name: 'newts', hue: 'woad', classes: [{ symbol: 'x', name: 'newts', start: 1 }] },
    ],
    parameters: [{ symbol: 'r', name: 'growth', value: 1, min: 0, max: 2, unit: '1/year' }],
    processes: [
      { id: 'births', name: 'Births', kind: 'birth', rate: 'r*x', effects: [{ class: 'x', amount: '1' }] },
    ],
  });
}
