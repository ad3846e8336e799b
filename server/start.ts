import { mkdirSync } from 'node:fs';
import { createServer } from 'node:http';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

import type { Logger } from 'pino';

import { createApp } from './app';
import { purgeDaily } from './commands/deleted-presets';
import type { Dependencies } from './dependencies';
import type { Environment } from './env';
import { FrontDoor } from './front-door';
import { forgetMailDaily } from './mail/claim-mail';
import { startLocalSmtp } from './mail/local-smtp';
import { Mailbox } from './mail/mailbox';
import { Mailer } from './mail/mailer';
import { createRateLimits, DEFAULT_RATE_LIMITS, DEMO_RATE_LIMITS } from './middleware/rate-limits';
import { sweepSessions } from './middleware/sessions';
import { createMigrator } from './migrations';
import { Database } from './models/database';
import { Passwords } from './passwords';
import { readOrCreateSecret } from './secret';
import { seedDemo } from './seeds/demo';
import { seedStarters } from './seeds/starters';

/** Time given, when the server is asked to stop, to requests under way and then to mail being handed over. */
const GRACE = { requests: 10_000, mail: 8_000 };

/** The built client lies beside the bundled server, or in dist when the sources run. */
function clientFolder(): string {
  const here = dirname(fileURLToPath(import.meta.url));
  return here.endsWith(join('dist', 'server'))
    ? join(here, '..', 'client')
    : join(here, '..', 'dist', 'client');
}

/** All that runs behind the door, and what ends it. */
async function openUp(environment: Environment, door: FrontDoor, logger: Logger) {
  mkdirSync(environment.dataFolder, { recursive: true, mode: 0o700 });
  const database = new Database(join(environment.dataFolder, 'moiety.sqlite'));
  await createMigrator(database).up();
  await seedStarters(database);

  const mailbox = new Mailbox(join(environment.dataFolder, 'mail'));
  const localSmtp = environment.smtpUrl === null ? await startLocalSmtp(mailbox, logger) : null;
  if (localSmtp !== null && !environment.demo)
    logger.warn('SMTP_URL is not set: mail is kept as files in the data folder and reaches nobody');
  const sessionSecret = environment.sessionSecret ?? readOrCreateSecret(environment.dataFolder);
  const smtpUrl = environment.smtpUrl ?? localSmtp?.url ?? '';
  const mailSettings = { smtpUrl, from: environment.mailFrom, publicUrl: environment.publicUrl };
  const mailer = new Mailer(database, { ...mailSettings, secret: sessionSecret }, logger);
  const dependencies: Dependencies = {
    settings: {
      publicUrl: environment.publicUrl,
      sessionSecret,
      secureCookies: environment.secureCookies,
      trustProxy: environment.trustProxy,
      demo: environment.demo,
      clientFolder: clientFolder(),
    },
    database,
    mailer,
    mailbox: environment.demo ? mailbox : null,
    passwords: new Passwords(),
    limits: createRateLimits(environment.demo ? DEMO_RATE_LIMITS : DEFAULT_RATE_LIMITS),
    logger,
  };
  if (environment.demo) await seedDemo(dependencies);
  const daily = [
    sweepSessions(database),
    await purgeDaily(database, (error) => logger.error({ err: error }, 'purge failed')),
    await forgetMailDaily(database, (error) =>
      logger.error({ err: error }, 'old mail could not be forgotten'),
    ),
  ];
  door.open(createApp(dependencies));
  mailer.wake();

  return async () => {
    for (const end of daily) end();
    // What is not handed over by then keeps its claim and goes out at the next start, under the same name.
    await atMost(GRACE.mail, mailer.stop());
    await localSmtp?.close();
    await database.close();
  };
}

async function atMost(milliseconds: number, work: Promise<void>): Promise<void> {
  let timer: NodeJS.Timeout | undefined;
  const patience = new Promise<void>((resolve) => {
    timer = setTimeout(resolve, milliseconds);
  });
  await Promise.race([work, patience]);
  clearTimeout(timer);
}

export interface RunningServer {
  /** Settles when everything is served; fails when the server cannot start. */
  readonly ready: Promise<void>;
  /** Takes nothing new, finishes what was taken, and closes the database. */
  stop(): Promise<void>;
}

/** Listens at once, makes everything ready behind the door, and opens it. */
export async function startServer(environment: Environment, logger: Logger): Promise<RunningServer> {
  const door = new FrontDoor();
  const server = createServer(door.handle);
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject);
    server.listen(environment.port, environment.host, resolve);
  });
  const opening = openUp(environment, door, logger);

  /** Takes no new connection; what comes in on those that are there is answered first, within `patience`. */
  const closePort = async (patience: number) => {
    const closed = new Promise<void>((resolve) => server.close(() => resolve()));
    await Promise.race([closed, door.close(patience)]);
    server.closeAllConnections();
    await closed;
  };
  return {
    ready: opening.then(
      () => undefined,
      async (error: unknown) => {
        await closePort(0);
        throw error;
      },
    ),
    stop: async () => {
      logger.info('stopping: what was taken is finished first');
      await closePort(GRACE.requests);
      const shutDown = await opening;
      await shutDown();
      logger.info('stopped');
    },
  };
}
