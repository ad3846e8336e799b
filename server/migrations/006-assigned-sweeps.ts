import type { Migration } from './migration';

const STATES = `('untouched', 'running', 'sent', 'agreed', 'differs', 'sent back')`;

/**
 * Sweeps that a lab sets, the work on them, what was handed in and how it was reviewed. People are kept by id and
 * name without a reference: what someone handed in stays with the lab when they go.
 */
export const assignedSweeps: Migration = {
  name: '006-assigned-sweeps',
  up: [
    `CREATE TABLE assigned_sweeps (
      id TEXT PRIMARY KEY NOT NULL,
      revision INTEGER NOT NULL CHECK (revision > 0),
      labId TEXT NOT NULL REFERENCES labs (id) ON DELETE CASCADE,
      state TEXT NOT NULL CHECK (state IN ('draft', 'open', 'closed')),
      setById TEXT,
      setByName TEXT NOT NULL,
      presetId TEXT NOT NULL,
      presetTitle TEXT NOT NULL,
      presetVersion INTEGER NOT NULL,
      document TEXT NOT NULL,
      title TEXT NOT NULL,
      brief TEXT NOT NULL,
      range JSON NOT NULL CHECK (json_valid(range)),
      freedom JSON NOT NULL CHECK (json_valid(freedom)),
      wanted JSON NOT NULL CHECK (json_valid(wanted)),
      reference JSON NOT NULL CHECK (json_valid(reference)),
      dueAt DATETIME,
      timeZone TEXT NOT NULL,
      createdAt DATETIME NOT NULL,
      openedAt DATETIME,
      closedAt DATETIME
    )`,
    `CREATE INDEX assigned_sweeps_by_lab ON assigned_sweeps (labId, createdAt)`,
    `CREATE INDEX assigned_sweeps_by_lab_and_state ON assigned_sweeps (labId, state, createdAt)`,
    `CREATE INDEX assigned_sweeps_by_preset ON assigned_sweeps (presetId)`,
    `CREATE TABLE assigned_people (
      assignedId TEXT NOT NULL REFERENCES assigned_sweeps (id) ON DELETE CASCADE,
      userId TEXT NOT NULL,
      name TEXT NOT NULL,
      state TEXT NOT NULL CHECK (state IN ${STATES}),
      addedAt DATETIME NOT NULL,
      PRIMARY KEY (assignedId, userId)
    )`,
    `CREATE INDEX assigned_people_by_person ON assigned_people (userId, assignedId)`,
    `CREATE INDEX assigned_people_by_state ON assigned_people (assignedId, state)`,
    `CREATE TABLE assigned_work (
      assignedId TEXT NOT NULL,
      userId TEXT NOT NULL,
      revision INTEGER NOT NULL CHECK (revision > 0),
      content TEXT NOT NULL CHECK (json_valid(content)),
      runs INTEGER NOT NULL,
      savedAt DATETIME NOT NULL,
      PRIMARY KEY (assignedId, userId),
      FOREIGN KEY (assignedId, userId) REFERENCES assigned_people (assignedId, userId) ON DELETE CASCADE
    )`,
    `CREATE TABLE hand_ins (
      id TEXT PRIMARY KEY NOT NULL,
      assignedId TEXT NOT NULL REFERENCES assigned_sweeps (id),
      userId TEXT NOT NULL,
      name TEXT NOT NULL,
      number INTEGER NOT NULL CHECK (number > 0),
      key TEXT NOT NULL,
      frozen TEXT NOT NULL CHECK (json_valid(frozen)),
      findings JSON NOT NULL CHECK (json_valid(findings)),
      code TEXT NOT NULL,
      late INTEGER NOT NULL CHECK (late IN (0, 1)),
      handedInAt DATETIME NOT NULL,
      UNIQUE (assignedId, userId, number),
      UNIQUE (userId, key)
    )`,
    `CREATE TRIGGER hand_ins_never_change BEFORE UPDATE ON hand_ins
      BEGIN SELECT RAISE(ABORT, 'what was handed in never changes'); END`,
    `CREATE TRIGGER hand_ins_never_go BEFORE DELETE ON hand_ins
      BEGIN SELECT RAISE(ABORT, 'what was handed in is never deleted'); END`,
    `CREATE TABLE reviews (
      handInId TEXT PRIMARY KEY NOT NULL REFERENCES hand_ins (id),
      revision INTEGER NOT NULL CHECK (revision > 0),
      judgements JSON NOT NULL CHECK (json_valid(judgements)),
      remarks JSON NOT NULL CHECK (json_valid(remarks)),
      outcome TEXT CHECK (outcome IN ('agreed', 'differs', 'sent back')),
      note TEXT NOT NULL,
      byId TEXT NOT NULL,
      byName TEXT NOT NULL,
      at DATETIME NOT NULL
    )`,
  ],
  down: [
    'DROP TABLE reviews',
    'DROP TRIGGER hand_ins_never_change',
    'DROP TRIGGER hand_ins_never_go',
    'DROP TABLE hand_ins',
    'DROP TABLE assigned_work',
    'DROP TABLE assigned_people',
    'DROP TABLE assigned_sweeps',
  ],
};
