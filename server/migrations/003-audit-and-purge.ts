import type { Migration } from './migration';

const LONG_DELETED = `EXISTS (SELECT 1 FROM presets WHERE id = old.presetId AND deletedAt IS NOT NULL
  AND deletedAt < strftime('%Y-%m-%d %H:%M:%f', 'now', '-30 days'))`;

/** The history, which nothing changes; and versions may go once their preset has been deleted for 30 days. */
export const auditAndPurge: Migration = {
  name: '003-audit-and-purge',
  up: [
    `CREATE TABLE audit_entries (
      id INTEGER PRIMARY KEY AUTOINCREMENT,
      at DATETIME NOT NULL,
      actorId TEXT,
      actorName TEXT NOT NULL,
      action TEXT NOT NULL,
      labId TEXT,
      subject TEXT NOT NULL,
      details JSON NOT NULL CHECK (json_valid(details))
    )`,
    `CREATE INDEX audit_by_lab ON audit_entries (labId, id)`,
    `CREATE INDEX audit_by_lab_and_actor ON audit_entries (labId, actorId, id)`,
    `CREATE INDEX audit_by_lab_and_action ON audit_entries (labId, action, id)`,
    `CREATE TRIGGER audit_never_changes BEFORE UPDATE ON audit_entries
      BEGIN SELECT RAISE(ABORT, 'the history never changes'); END`,
    `CREATE TRIGGER audit_never_goes BEFORE DELETE ON audit_entries
      BEGIN SELECT RAISE(ABORT, 'the history is never deleted'); END`,
    `CREATE INDEX presets_by_deletion ON presets (deletedAt) WHERE deletedAt IS NOT NULL`,
    `DROP TRIGGER preset_versions_never_go`,
    `CREATE TRIGGER preset_versions_never_go BEFORE DELETE ON preset_versions WHEN NOT ${LONG_DELETED}
      BEGIN SELECT RAISE(ABORT, 'a saved version is never deleted'); END`,
  ],
  down: [
    'DROP TRIGGER preset_versions_never_go',
    `CREATE TRIGGER preset_versions_never_go BEFORE DELETE ON preset_versions
      BEGIN SELECT RAISE(ABORT, 'a saved version is never deleted'); END`,
    'DROP INDEX presets_by_deletion',
    'DROP TRIGGER audit_never_changes',
    'DROP TRIGGER audit_never_goes',
    'DROP TABLE audit_entries',
  ],
};
