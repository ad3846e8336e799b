import { mkdirSync } from 'node:fs';
import { createServer } from 'node:http';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

import { createApp } from './app';
import { purgeDaily } from './commands/deleted-presets';
import type { Dependencies } from './dependencies';
import { EnvironmentError, readEnvironment, type Environment } from './env';
import { createLogger } from './logger';
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

/** Time that requests under way are given when the server is asked to stop. */
const GRACE = 10_000;

/** The built client lies beside the bundled server, or in dist when the sources run. */
function clientFolder(): string {
  const here = dirname(fileURLToPath(import.meta.url));
  return here.endsWith(join('dist', 'server'))
    ? join(here, '..', 'client')
    : join(here, '..', 'dist', 'client');
}

async function start(environment: Environment): Promise<void> {
  const logger = createLogger(environment.logLevel);
  mkdirSync(environment.dataFolder, { recursive: true, mode: 0o700 });
  const database = new Database(join(environment.dataFolder, 'moiety.sqlite'));
  await createMigrator(database).up();
  await seedStarters(database);

  const mailbox = new Mailbox(join(environment.dataFolder, 'mail'));
  const localSmtp = environment.smtpUrl === null ? await startLocalSmtp(mailbox, logger) : null;
  if (localSmtp !== null && !environment.demo) {
    logger.warn('SMTP_URL is not set: mail is kept as files in the data folder and reaches nobody');
  }
  const sessionSecret = environment.sessionSecret ?? readOrCreateSecret(environment.dataFolder);
  const mailer = new Mailer(
    database,
    {
      smtpUrl: environment.smtpUrl ?? localSmtp?.url ?? '',
      from: environment.mailFrom,
      publicUrl: environment.publicUrl,
      secret: sessionSecret,
    },
    logger,
  );
  let ready = true;
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
    isReady: () => ready,
  };
  if (environment.demo) await seedDemo(dependencies);

  const server = createServer(createApp(dependencies));
  const stopSweeping = sweepSessions(database);
  const stopPurging = await purgeDaily(database, (error) => logger.error({ err: error }, 'purge failed'));
  const stopForgetting = await forgetMailDaily(database, (error) =>
    logger.error({ err: error }, 'old mail could not be forgotten'),
  );
  mailer.wake();
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject);
    server.listen(environment.port, environment.host, resolve);
  });
  process.stdout.write(`Moiety is at ${environment.publicUrl}\n`);
  if (environment.demo)
    process.stdout.write('Demo: sign in as one of the invented people listed on the sign-in page.\n');

  const stop = async () => {
    if (!ready) return;
    ready = false;
    stopSweeping();
    stopPurging();
    stopForgetting();
    const closed = new Promise<void>((resolve) => server.close(() => resolve()));
    server.closeIdleConnections();
    setTimeout(() => server.closeAllConnections(), GRACE).unref();
    await closed;
    await mailer.stop();
    await localSmtp?.close();
    await database.close();
  };
  process.once('SIGTERM', () => void stop());
  process.once('SIGINT', () => void stop());
}

try {
  await start(readEnvironment(process.env));
} catch (error) {
  const expected =
    error instanceof EnvironmentError || (error as NodeJS.ErrnoException).code === 'EADDRINUSE';
  const words =
    (error as NodeJS.ErrnoException).code === 'EADDRINUSE'
      ? 'The server cannot start: its port is taken. Stop what uses it, or set PORT to another.'
      : String(error instanceof Error ? (expected ? error.message : error.stack) : error);
  process.stderr.write(`${words}\n`);
  process.exitCode = 1;
}
