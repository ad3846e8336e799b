import type { Migration } from './migration';

/** Mail that waits, and what each address wants of it. */
export const mailQueue: Migration = {
  name: '004-mail-queue',
  up: [
    `CREATE TABLE mail_messages (
      id TEXT PRIMARY KEY NOT NULL,
      idempotencyKey TEXT NOT NULL UNIQUE,
      kind TEXT NOT NULL,
      address TEXT NOT NULL COLLATE NOCASE,
      senderId TEXT REFERENCES users (id) ON DELETE SET NULL,
      content JSON CHECK (content IS NULL OR json_valid(content)),
      state TEXT NOT NULL CHECK (state IN ('waiting', 'sent', 'given up', 'withheld', 'too late')),
      attempts INTEGER NOT NULL DEFAULT 0 CHECK (attempts >= 0),
      dueAt DATETIME NOT NULL,
      claim TEXT,
      bundleId TEXT,
      expiresAt DATETIME,
      lastError TEXT NOT NULL DEFAULT '',
      createdAt DATETIME NOT NULL,
      settledAt DATETIME,
      CHECK (state = 'waiting' OR content IS NULL)
    )`,
    `CREATE INDEX mail_messages_due ON mail_messages (dueAt) WHERE state = 'waiting'`,
    `CREATE INDEX mail_messages_by_address ON mail_messages (address, createdAt)`,
    `CREATE INDEX mail_messages_by_sender ON mail_messages (senderId, createdAt) WHERE senderId IS NOT NULL`,
    `CREATE INDEX mail_messages_by_bundle ON mail_messages (bundleId) WHERE bundleId IS NOT NULL`,
    `CREATE INDEX mail_messages_by_settling ON mail_messages (settledAt) WHERE settledAt IS NOT NULL`,
    `CREATE TABLE mail_settings (
      address TEXT PRIMARY KEY NOT NULL COLLATE NOCASE,
      timings JSON NOT NULL CHECK (json_valid(timings)),
      digestHour INTEGER NOT NULL CHECK (digestHour BETWEEN 0 AND 23),
      timeZone TEXT NOT NULL
    )`,
  ],
  down: ['DROP TABLE mail_settings', 'DROP TABLE mail_messages'],
};
