import type { Logger } from 'pino';

import type { Mailbox } from './mail/mailbox';
import type { Mailer } from './mail/mailer';
import type { Database } from './models/database';
import type { Passwords } from './passwords';
import type { RateLimits } from './middleware/rate-limits';

export interface Settings {
  publicUrl: string;
  sessionSecret: string;
  secureCookies: boolean;
  trustProxy: number;
  demo: boolean;
  /** Folder of the built client; null serves the API alone. */
  clientFolder: string | null;
}

/** All that the application needs from outside; tests hand in their own. */
export interface Dependencies {
  settings: Settings;
  database: Database;
  mailer: Mailer;
  /** The demo's mail page; null unless `demo`. */
  mailbox: Mailbox | null;
  passwords: Passwords;
  limits: RateLimits;
  logger: Logger;
}
