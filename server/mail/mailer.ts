import { createTransport, type Transporter } from 'nodemailer';
import type { Logger } from 'pino';

export interface Message {
  to: string;
  subject: string;
  text: string;
}

const ATTEMPTS = 3;

/**
 * Hands messages to an SMTP server after the answer has gone out, so that no answer waits for mail or tells by
 * its delay whether one was sent. A server that is briefly away gets two more attempts.
 */
export class Mailer {
  private readonly transport: Transporter;
  private readonly underway = new Set<Promise<void>>();

  constructor(
    smtpUrl: string,
    private readonly from: string,
    private readonly logger: Logger,
    private readonly pauseMilliseconds = 2_000,
  ) {
    this.transport = createTransport(smtpUrl);
  }

  send(message: Message): void {
    const sending = this.attempt(message).finally(() => this.underway.delete(sending));
    this.underway.add(sending);
  }

  /** Settles when everything handed in so far has been taken or given up. */
  async idle(): Promise<void> {
    while (this.underway.size > 0) await Promise.all(this.underway);
  }

  close(): void {
    this.transport.close();
  }

  private async attempt(message: Message): Promise<void> {
    for (let attempt = 1; attempt <= ATTEMPTS; attempt += 1) {
      try {
        await this.transport.sendMail({
          from: this.from,
          to: { name: '', address: message.to },
          subject: message.subject,
          text: message.text,
        });
        return;
      } catch (error) {
        this.logger.error({ err: error, subject: message.subject, attempt }, 'a message was not taken');
        if (attempt < ATTEMPTS) {
          await new Promise((resolve) => setTimeout(resolve, attempt * this.pauseMilliseconds));
        }
      }
    }
  }
}
