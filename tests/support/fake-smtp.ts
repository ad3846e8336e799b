import type { AddressInfo } from 'node:net';

import { SMTPServer } from 'smtp-server';

/** What the server does with the next message. */
export type Mood = 'take' | 'busy' | 'refuse' | 'wait';

export interface FakeSmtp {
  readonly url: string;
  /** Messages taken, as they came. */
  readonly taken: string[];
  readonly attempts: () => number;
  /** Moods of the messages to come; afterwards it takes them. */
  readonly moods: Mood[];
  /** Lets go of messages it waits with. */
  readonly release: () => void;
  close(): Promise<void>;
}

/** An SMTP server that takes messages, is busy, refuses for good, or keeps the sender waiting, as a test has it. */
export async function startFakeSmtp(): Promise<FakeSmtp> {
  const taken: string[] = [];
  const moods: Mood[] = [];
  const held: (() => void)[] = [];
  let attempts = 0;
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['AUTH', 'STARTTLS'],
    disableReverseLookup: true,
    logger: false,
    onData(stream, _session, done) {
      attempts += 1;
      const mood = moods.shift() ?? 'take';
      const chunks: Buffer[] = [];
      stream.on('data', (chunk: Buffer) => chunks.push(chunk));
      stream.on('end', () => {
        const take = () => {
          taken.push(Buffer.concat(chunks).toString());
          done();
        };
        if (mood === 'take') take();
        else if (mood === 'wait') held.push(take);
        else {
          const [responseCode, words] = mood === 'busy' ? [451, 'Try again later'] : [550, 'No such person'];
          done(Object.assign(new Error(words), { responseCode }));
        }
      });
    },
  });
  server.on('error', () => undefined);
  await new Promise<void>((resolve) => void server.listen(0, '127.0.0.1', resolve));
  return {
    url: `smtp://127.0.0.1:${(server.server.address() as AddressInfo).port}`,
    taken,
    attempts: () => attempts,
    moods,
    release: () => held.splice(0).forEach((take) => take()),
    close: () => new Promise((resolve) => server.close(resolve)),
  };
}
