import type { Migration } from './migration';

export const presetsAndLinks: Migration = {
  name: '002-presets-and-links',
  up: [
    `CREATE TABLE presets (
      id TEXT PRIMARY KEY NOT NULL,
      starterKey TEXT UNIQUE,
      ownerId TEXT REFERENCES users (id) ON DELETE RESTRICT,
      labId TEXT REFERENCES labs (id) ON DELETE RESTRICT,
      visibility TEXT NOT NULL CHECK (visibility IN ('private', 'lab', 'starter')),
      title TEXT NOT NULL,
      summary TEXT NOT NULL,
      tagLines TEXT NOT NULL,
      populations JSON NOT NULL,
      headNumber INTEGER NOT NULL CHECK (headNumber > 0),
      createdAt DATETIME NOT NULL,
      changedAt DATETIME NOT NULL,
      deletedAt DATETIME,
      CHECK ((starterKey IS NULL) = (ownerId IS NOT NULL)),
      CHECK ((starterKey IS NOT NULL) = (visibility = 'starter')),
      CHECK ((labId IS NOT NULL) = (visibility = 'lab'))
    )`,
    `CREATE INDEX presets_by_owner ON presets (ownerId, changedAt)`,
    `CREATE INDEX presets_by_lab ON presets (labId, changedAt)`,
    `CREATE INDEX presets_by_change ON presets (changedAt)`,
    `CREATE INDEX presets_by_title ON presets (title COLLATE NOCASE)`,
    `CREATE TABLE preset_versions (
      presetId TEXT NOT NULL REFERENCES presets (id) ON DELETE RESTRICT,
      number INTEGER NOT NULL CHECK (number > 0),
      document TEXT NOT NULL CHECK (json_valid(document)),
      note TEXT NOT NULL,
      authorId TEXT REFERENCES users (id) ON DELETE RESTRICT,
      restoredFrom INTEGER,
      savedAt DATETIME NOT NULL,
      PRIMARY KEY (presetId, number)
    )`,
    `CREATE TRIGGER preset_versions_never_change BEFORE UPDATE ON preset_versions
      BEGIN SELECT RAISE(ABORT, 'a saved version never changes'); END`,
    `CREATE TRIGGER preset_versions_never_go BEFORE DELETE ON preset_versions
      BEGIN SELECT RAISE(ABORT, 'a saved version is never deleted'); END`,
    `CREATE TABLE preset_tags (
      presetId TEXT NOT NULL REFERENCES presets (id) ON DELETE CASCADE,
      tag TEXT NOT NULL COLLATE NOCASE,
      PRIMARY KEY (presetId, tag)
    )`,
    `CREATE INDEX preset_tags_by_tag ON preset_tags (tag)`,
    `CREATE VIRTUAL TABLE preset_words USING fts5(
      presetId UNINDEXED, title, summary, tags, tokenize = 'unicode61 remove_diacritics 2', prefix = '2 3'
    )`,
    `CREATE TRIGGER preset_words_insert AFTER INSERT ON presets BEGIN
      INSERT INTO preset_words (presetId, title, summary, tags) VALUES (new.id, new.title, new.summary, new.tagLines);
    END`,
    `CREATE TRIGGER preset_words_update AFTER UPDATE OF title, summary, tagLines ON presets BEGIN
      DELETE FROM preset_words WHERE presetId = old.id;
      INSERT INTO preset_words (presetId, title, summary, tags) VALUES (new.id, new.title, new.summary, new.tagLines);
    END`,
    `CREATE TRIGGER preset_words_delete AFTER DELETE ON presets BEGIN
      DELETE FROM preset_words WHERE presetId = old.id;
    END`,
    `CREATE TABLE share_links (
      id TEXT PRIMARY KEY NOT NULL,
      presetId TEXT NOT NULL REFERENCES presets (id) ON DELETE CASCADE,
      tokenHash TEXT NOT NULL UNIQUE,
      label TEXT NOT NULL,
      createdById TEXT NOT NULL REFERENCES users (id) ON DELETE RESTRICT,
      createdAt DATETIME NOT NULL,
      revokedAt DATETIME,
      opened INTEGER NOT NULL DEFAULT 0
    )`,
    `CREATE INDEX share_links_by_preset ON share_links (presetId)`,
  ],
  down: [
    'DROP TABLE share_links',
    'DROP TRIGGER preset_words_insert',
    'DROP TRIGGER preset_words_update',
    'DROP TRIGGER preset_words_delete',
    'DROP TABLE preset_words',
    'DROP TABLE preset_tags',
    'DROP TRIGGER preset_versions_never_change',
    'DROP TRIGGER preset_versions_never_go',
    'DROP TABLE preset_versions',
    'DROP TABLE presets',
  ],
};
