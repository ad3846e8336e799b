import type { Migration } from './migration';

const OPEN = 'acceptedAt IS NULL AND declinedAt IS NULL AND withdrawnAt IS NULL';

/** Invitations to labs, and when members joined. */
export const invitations: Migration = {
  name: '005-invitations',
  up: [
    `ALTER TABLE memberships ADD COLUMN joinedAt DATETIME`,
    `CREATE TABLE invitations (
      id TEXT PRIMARY KEY NOT NULL,
      labId TEXT NOT NULL REFERENCES labs (id) ON DELETE CASCADE,
      email TEXT NOT NULL COLLATE NOCASE,
      role TEXT NOT NULL CHECK (role IN ('supervisor', 'researcher', 'student', 'collaborator')),
      invitedById TEXT REFERENCES users (id) ON DELETE SET NULL,
      sends INTEGER NOT NULL CHECK (sends > 0),
      createdAt DATETIME NOT NULL,
      expiresAt DATETIME NOT NULL,
      acceptedAt DATETIME,
      declinedAt DATETIME,
      withdrawnAt DATETIME
    )`,
    `CREATE UNIQUE INDEX invitations_open ON invitations (labId, email) WHERE ${OPEN}`,
    `CREATE INDEX invitations_by_lab ON invitations (labId, createdAt)`,
    `CREATE INDEX invitations_by_email ON invitations (email)`,
    `CREATE INDEX invitations_by_inviter ON invitations (invitedById)`,
    `CREATE TABLE invitation_tokens (
      tokenHash TEXT PRIMARY KEY NOT NULL,
      invitationId TEXT NOT NULL REFERENCES invitations (id) ON DELETE CASCADE,
      forUserId TEXT REFERENCES users (id) ON DELETE CASCADE
    )`,
    `CREATE INDEX invitation_tokens_by_invitation ON invitation_tokens (invitationId)`,
    `CREATE INDEX invitation_tokens_by_user ON invitation_tokens (forUserId) WHERE forUserId IS NOT NULL`,
  ],
  down: [
    'DROP TABLE invitation_tokens',
    'DROP TABLE invitations',
    'ALTER TABLE memberships DROP COLUMN joinedAt',
  ],
};
