import type { AddressInfo } from 'node:net';

import type { Logger } from 'pino';
import { SMTPServer } from 'smtp-server';

import type { Mailbox } from './mailbox';

const LARGEST_MESSAGE = 1024 * 1024;

export interface LocalSmtp {
  /** Address for the mailer. */
  url: string;
  close(): Promise<void>;
}

/** A mail server on loopback that delivers nowhere: every message becomes a file in the mailbox. */
export async function startLocalSmtp(mailbox: Mailbox, logger: Logger): Promise<LocalSmtp> {
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['AUTH', 'STARTTLS'],
    disableReverseLookup: true,
    size: LARGEST_MESSAGE,
    logger: false,
    onData(stream, _session, done) {
      const chunks: Buffer[] = [];
      stream.on('data', (chunk: Buffer) => chunks.push(chunk));
      stream.on('end', () => {
        if (stream.sizeExceeded) {
          done(Object.assign(new Error('The message is too large.'), { responseCode: 552 }));
          return;
        }
        mailbox.store(Buffer.concat(chunks)).then(() => done(), done);
      });
    },
  });
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject);
    server.listen(0, '127.0.0.1', resolve);
  });
  server.on('error', (error) => logger.warn({ err: error }, 'the local mail server met a fault'));
  const { port } = server.server.address() as AddressInfo;
  return {
    url: `smtp://127.0.0.1:${port}`,
    close: () => new Promise((resolve) => server.close(resolve)),
  };
}
