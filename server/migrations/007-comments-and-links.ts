import type { Migration } from './migration';

/**
 * Comments with their threads; share links that end, that allow a copy or only a view, and that know when they
 * were last opened; the history found by preset. Authors are kept by id and name, so that their words stay theirs.
 */
export const commentsAndLinks: Migration = {
  name: '007-comments-and-links',
  up: [
    `CREATE TABLE comments (
      id TEXT PRIMARY KEY NOT NULL,
      presetId TEXT NOT NULL REFERENCES presets (id) ON DELETE CASCADE,
      threadId TEXT REFERENCES comments (id) ON DELETE CASCADE,
      revision INTEGER NOT NULL DEFAULT 1 CHECK (revision > 0),
      authorId TEXT NOT NULL,
      authorName TEXT NOT NULL,
      text TEXT NOT NULL,
      version INTEGER,
      pin JSON CHECK (pin IS NULL OR json_valid(pin)),
      createdAt DATETIME NOT NULL,
      editedAt DATETIME,
      deletedAt DATETIME,
      resolvedAt DATETIME,
      resolvedByName TEXT,
      CHECK (threadId IS NULL OR (version IS NULL AND pin IS NULL AND resolvedAt IS NULL))
    )`,
    `CREATE INDEX comments_by_preset ON comments (presetId, threadId, createdAt)`,
    `CREATE INDEX comments_by_thread ON comments (threadId, createdAt)`,
    `CREATE INDEX comments_by_preset_and_time ON comments (presetId, createdAt)`,
    `ALTER TABLE share_links ADD COLUMN expiresAt DATETIME`,
    `ALTER TABLE share_links ADD COLUMN access TEXT NOT NULL DEFAULT 'copy' CHECK (access IN ('view', 'copy'))`,
    `ALTER TABLE share_links ADD COLUMN lastOpenedAt DATETIME`,
    `CREATE INDEX audit_by_preset ON audit_entries (json_extract(details, '$.preset'), id)`,
  ],
  down: [
    'DROP INDEX audit_by_preset',
    'ALTER TABLE share_links DROP COLUMN lastOpenedAt',
    'ALTER TABLE share_links DROP COLUMN access',
    'ALTER TABLE share_links DROP COLUMN expiresAt',
    'DROP TABLE comments',
  ],
};
