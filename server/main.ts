import { EnvironmentError, readEnvironment } from './env';
import { createLogger } from './logger';
import { startServer, type RunningServer } from './start';

/** However long something hangs, the process has ended by then. */
const LAST_MOMENT = 25_000;

function stopOnSignals(server: RunningServer, onFault: (error: unknown) => void): void {
  let stopping = false;
  const stop = () => {
    if (stopping) return;
    stopping = true;
    setTimeout(() => process.exit(1), LAST_MOMENT).unref();
    server.stop().then(() => process.exit(0), onFault);
  };
  process.on('SIGTERM', stop);
  process.on('SIGINT', stop);
}

function tell(error: unknown): void {
  const taken = (error as NodeJS.ErrnoException).code === 'EADDRINUSE';
  const expected = error instanceof EnvironmentError;
  const words = taken
    ? 'The server cannot start: its port is taken. Stop what uses it, or set PORT to another.'
    : String(error instanceof Error ? (expected ? error.message : error.stack) : error);
  process.stderr.write(`${words}\n`);
  process.exitCode = 1;
}

try {
  const environment = readEnvironment(process.env);
  const server = await startServer(environment, createLogger(environment.logLevel));
  stopOnSignals(server, (error) => {
    tell(error);
    process.exit(1);
  });
  await server.ready;
  process.stdout.write(`Moiety is at ${environment.publicUrl}\n`);
  if (environment.demo)
    process.stdout.write('Demo: sign in as one of the invented people listed on the sign-in page.\n');
} catch (error) {
  tell(error);
}
