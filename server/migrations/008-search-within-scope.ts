import type { Migration } from './migration';

const TOKENS = `tokenize = 'unicode61 remove_diacritics 2', prefix = '2 3'`;
const FORGET = ['insert', 'update', 'delete'].map((name) => `DROP TRIGGER preset_words_${name}`);

/**
 * Who may see a preset, as words beside those of its title: a search then meets only what its reader may see,
 * however common a word is. The phrases are made again in `server/commands/list-presets.ts`.
 */
const scopeOf = (preset: string) =>
  `CASE ${preset}visibility WHEN 'starter' THEN 'starter' WHEN 'lab' THEN 'lab ' || ${preset}labId
    ELSE 'own ' || ${preset}ownerId END`;
const rowOf = (preset: string) => `(SELECT number FROM preset_word_rows WHERE presetId = ${preset}.id)`;

/** Search within what its reader may see, words found by number instead of by reading them all, and starters by an index. */
export const searchWithinScope: Migration = {
  name: '008-search-within-scope',
  up: [
    ...FORGET,
    'DROP TABLE preset_words',
    `CREATE TABLE preset_word_rows (number INTEGER PRIMARY KEY NOT NULL, presetId TEXT NOT NULL UNIQUE)`,
    `CREATE VIRTUAL TABLE preset_words USING fts5(scope, title, summary, tags, ${TOKENS})`,
    'INSERT INTO preset_word_rows (presetId) SELECT id FROM presets',
    `INSERT INTO preset_words (rowid, scope, title, summary, tags)
      SELECT r.number, ${scopeOf('p.')}, p.title, p.summary, p.tagLines
      FROM preset_word_rows r JOIN presets p ON p.id = r.presetId`,
    `CREATE TRIGGER preset_words_insert AFTER INSERT ON presets BEGIN
      INSERT INTO preset_word_rows (presetId) VALUES (new.id);
      INSERT INTO preset_words (rowid, scope, title, summary, tags)
        VALUES (${rowOf('new')}, ${scopeOf('new.')}, new.title, new.summary, new.tagLines);
    END`,
    `CREATE TRIGGER preset_words_update AFTER UPDATE ON presets
      WHEN old.title <> new.title OR old.summary <> new.summary OR old.tagLines <> new.tagLines
        OR old.visibility <> new.visibility OR old.labId IS NOT new.labId OR old.ownerId IS NOT new.ownerId
      BEGIN
      UPDATE preset_words SET scope = ${scopeOf('new.')}, title = new.title, summary = new.summary,
        tags = new.tagLines WHERE rowid = ${rowOf('old')};
    END`,
    `CREATE TRIGGER preset_words_delete AFTER DELETE ON presets BEGIN
      DELETE FROM preset_words WHERE rowid = ${rowOf('old')};
      DELETE FROM preset_word_rows WHERE presetId = old.id;
    END`,
    `CREATE INDEX presets_starters ON presets (changedAt) WHERE visibility = 'starter'`,
  ],
  down: [
    'DROP INDEX presets_starters',
    ...FORGET,
    'DROP TABLE preset_words',
    'DROP TABLE preset_word_rows',
    `CREATE VIRTUAL TABLE preset_words USING fts5(
      presetId UNINDEXED, title, summary, tags, ${TOKENS}
    )`,
    `INSERT INTO preset_words (presetId, title, summary, tags) SELECT id, title, summary, tagLines FROM presets`,
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
  ],
};
