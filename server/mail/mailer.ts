import { createTransport, type Transporter } from 'nodemailer';
import type { Logger } from 'pino';

import { mayChoose } from '@/contract/mail';

import type { Database } from '../models/database';
import type { MailContent } from '../models/mail-message';
import { claimMail, nextDue, postponeClaim, settleClaim, type ClaimedMail } from './claim-mail';
import { renderMail } from './render-mail';
import { makeUnsubscribeToken } from './unsubscribe-token';

export interface MailerSettings {
  readonly smtpUrl: string;
  readonly from: string;
  readonly publicUrl: string;
  /** Signs the links that turn mail off. */
  readonly secret: string;
}

/** Messages handed over at the same time. */
const LANES = 3;
/** Half a minute, doubled with each attempt, six hours at most: fifteen attempts span about two days. */
const FIRST_PAUSE = 30_000;
const LONGEST_PAUSE = 6 * 60 * 60_000;
const MOST_ATTEMPTS = 15;
/** The queue is looked at this often even when nothing wakes it. */
const LONGEST_SLEEP = 60_000;
/** Waits of one handing over; all of them together stay below the lease of a claim. */
const PATIENCE = { connectionTimeout: 20_000, greetingTimeout: 20_000, socketTimeout: 60_000 };

/** Pause before the next attempt; spread by a fifth, so that what failed together does not return together. */
export function pauseAfter(attempts: number, chance = Math.random()): number {
  const pause = Math.min(LONGEST_PAUSE, FIRST_PAUSE * 2 ** (attempts - 1));
  return Math.round(pause * (0.8 + 0.4 * chance));
}

/** Answers of 500 and above are final; everything else may pass. */
function isFinal(error: unknown): boolean {
  const { responseCode } = error as { responseCode?: unknown };
  return typeof responseCode === 'number' && responseCode >= 500;
}

const domainOf = (from: string) => /@([^\s<>@]+)>?\s*$/.exec(from)?.[1] ?? 'localhost';

/**
 * Carries the queue's messages to an SMTP server, after the answer has gone out, so that no answer waits for
 * mail or tells by its delay whether one was sent. A message is claimed, handed over and settled; one whose
 * process died is claimed again when its lease ends, under the same Message-ID.
 */
export class Mailer {
  private readonly transport: Transporter;
  private pass: Promise<void> | null = null;
  private wokenMeanwhile = false;
  private timer: NodeJS.Timeout | null = null;
  private stopped = false;

  constructor(
    private readonly database: Database,
    private readonly settings: MailerSettings,
    private readonly logger: Logger,
  ) {
    this.transport = createTransport({ url: settings.smtpUrl, ...PATIENCE });
  }

  /** Begins to send what is due. Asked while it sends, it looks once more at the end. */
  wake(): void {
    if (this.stopped) return;
    if (this.pass !== null) {
      this.wokenMeanwhile = true;
      return;
    }
    this.pass = this.sendDue().finally(() => {
      this.pass = null;
      if (this.wokenMeanwhile) this.wake();
      else void this.sleep();
    });
  }

  /** Settles when all that is due now has been handed over or postponed. */
  async idle(): Promise<void> {
    while (this.pass !== null) await this.pass;
  }

  /** Claims nothing more, and settles when what was claimed has been handed over. */
  async stop(): Promise<void> {
    this.stopped = true;
    if (this.timer !== null) clearTimeout(this.timer);
    await this.idle();
    this.transport.close();
  }

  private async sendDue(): Promise<void> {
    try {
      do {
        this.wokenMeanwhile = false;
        await Promise.all(Array.from({ length: LANES }, () => this.drive()));
      } while (this.wokenMeanwhile && !this.stopped);
    } catch (error) {
      this.logger.error({ err: error }, 'the mail queue met a fault');
    }
  }

  private async drive(): Promise<void> {
    while (!this.stopped) {
      const claimed = await claimMail(this.database);
      if (claimed === null) return;
      await this.deliver(claimed);
    }
  }

  private async sleep(): Promise<void> {
    if (this.stopped) return;
    if (this.timer !== null) clearTimeout(this.timer);
    const due = await nextDue(this.database).catch(() => null);
    // Once more, for it may have been stopped meanwhile.
    if (this.stopped) return;
    const wait = due === null ? LONGEST_SLEEP : Math.max(0, due.getTime() - Date.now());
    this.timer = setTimeout(() => this.wake(), Math.min(LONGEST_SLEEP, wait));
    this.timer.unref();
  }

  private async deliver({ claim, messages }: ClaimedMail): Promise<void> {
    const [lead] = messages;
    const about = { mail: lead.bundleId, kind: lead.kind, attempt: lead.attempts };
    try {
      await this.transport.sendMail(this.compose({ claim, messages }));
    } catch (error) {
      const reason = error instanceof Error ? error.message : String(error);
      if (isFinal(error) || lead.attempts >= MOST_ATTEMPTS) {
        this.logger.error({ err: error, ...about }, 'a message was given up');
        await settleClaim(this.database, claim, 'given up', reason);
        return;
      }
      this.logger.warn({ err: error, ...about }, 'a message was not taken and waits');
      await postponeClaim(this.database, claim, new Date(Date.now() + pauseAfter(lead.attempts)), reason);
      return;
    }
    if (!(await settleClaim(this.database, claim, 'sent')))
      this.logger.warn(about, 'a message was handed over after its claim had ended');
  }

  private compose({ messages }: ClaimedMail) {
    const { publicUrl, secret, from } = this.settings;
    const [lead] = messages;
    const kinds = new Set(messages.map(({ kind }) => kind));
    const scope = kinds.size === 1 ? lead.kind : 'all';
    const token = makeUnsubscribeToken({ address: lead.address, scope }, secret);
    const footer = mayChoose(lead.kind, 'off')
      ? {
          settingsUrl: `${publicUrl}/account#mail`,
          unsubscribeUrl: `${publicUrl}/unsubscribe?token=${token}`,
        }
      : null;
    const contents = messages.flatMap(({ content }): MailContent[] => (content === null ? [] : [content]));
    return {
      from,
      to: { name: '', address: lead.address },
      messageId: `<${lead.bundleId ?? lead.id}@${domainOf(from)}>`,
      ...renderMail(contents, footer),
      headers: {
        'Auto-Submitted': 'auto-generated',
        ...(footer === null
          ? {}
          : {
              'List-Unsubscribe': `<${publicUrl}/api/mail/unsubscribe?token=${token}>`,
              'List-Unsubscribe-Post': 'List-Unsubscribe=One-Click',
            }),
      },
    };
  }
}
