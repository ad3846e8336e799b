import type { Migration } from './migration';

export const accountsAndLabs: Migration = {
  name: '001-accounts-and-labs',
  up: [
    `CREATE TABLE users (
      id TEXT PRIMARY KEY NOT NULL,
      name TEXT NOT NULL,
      email TEXT NOT NULL COLLATE NOCASE UNIQUE,
      passwordHash TEXT NOT NULL,
      demo INTEGER NOT NULL DEFAULT 0 CHECK (demo IN (0, 1)),
      createdAt DATETIME NOT NULL
    )`,
    `CREATE TABLE labs (
      id TEXT PRIMARY KEY NOT NULL,
      name TEXT NOT NULL,
      createdAt DATETIME NOT NULL
    )`,
    `CREATE TABLE memberships (
      userId TEXT NOT NULL REFERENCES users (id) ON DELETE CASCADE,
      labId TEXT NOT NULL REFERENCES labs (id) ON DELETE CASCADE,
      role TEXT NOT NULL CHECK (role IN ('supervisor', 'researcher', 'student', 'collaborator')),
      PRIMARY KEY (userId, labId)
    )`,
    `CREATE INDEX memberships_by_lab ON memberships (labId)`,
    `CREATE TABLE pending_accounts (
      tokenHash TEXT PRIMARY KEY NOT NULL,
      name TEXT NOT NULL,
      email TEXT NOT NULL COLLATE NOCASE,
      passwordHash TEXT NOT NULL,
      expiresAt DATETIME NOT NULL
    )`,
    `CREATE INDEX pending_accounts_by_email ON pending_accounts (email)`,
    `CREATE TABLE password_resets (
      tokenHash TEXT PRIMARY KEY NOT NULL,
      userId TEXT NOT NULL REFERENCES users (id) ON DELETE CASCADE,
      expiresAt DATETIME NOT NULL
    )`,
    `CREATE INDEX password_resets_by_user ON password_resets (userId)`,
    `CREATE TABLE sessions (
      sid TEXT PRIMARY KEY NOT NULL,
      publicId TEXT NOT NULL UNIQUE,
      userId TEXT NOT NULL REFERENCES users (id) ON DELETE CASCADE,
      agent TEXT NOT NULL,
      data TEXT NOT NULL,
      expires DATETIME NOT NULL,
      createdAt DATETIME NOT NULL,
      lastSeenAt DATETIME NOT NULL
    )`,
    `CREATE INDEX sessions_by_user ON sessions (userId)`,
    `CREATE INDEX sessions_by_expiry ON sessions (expires)`,
  ],
  down: [
    'DROP TABLE sessions',
    'DROP TABLE password_resets',
    'DROP TABLE pending_accounts',
    'DROP TABLE memberships',
    'DROP TABLE labs',
    'DROP TABLE users',
  ],
};
