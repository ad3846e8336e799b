import { QueryTypes, type Sequelize, type Transaction } from 'sequelize';

import { defineAssignedPerson } from './assigned-person';
import { defineAssignedSweep } from './assigned-sweep';
import { defineAssignedWork } from './assigned-work';
import { defineAuditEntry } from './audit-entry';
import { defineComment } from './comment';
import { connectSqlite, replaceWriter } from './connection';
import { defineHandIn } from './hand-in';
import { defineInvitation } from './invitation';
import { defineInvitationToken } from './invitation-token';
import { defineLab } from './lab';
import { defineMailMessage } from './mail-message';
import { defineMailSettings } from './mail-settings';
import { defineMembership } from './membership';
import { definePasswordReset } from './password-reset';
import { definePendingAccount } from './pending-account';
import { definePreset } from './preset';
import { definePresetTag } from './preset-tag';
import { definePresetVersion } from './preset-version';
import { Reader, type ReadValues } from './reader';
import { defineReview } from './review';
import { defineSessionRecord } from './session-record';
import { defineShareLink } from './share-link';
import { TransactionQueue } from './transaction-queue';
import { defineUser } from './user';

function defineModels(sequelize: Sequelize) {
  const models = {
    User: defineUser(sequelize),
    Lab: defineLab(sequelize),
    Membership: defineMembership(sequelize),
    Invitation: defineInvitation(sequelize),
    InvitationToken: defineInvitationToken(sequelize),
    PendingAccount: definePendingAccount(sequelize),
    PasswordReset: definePasswordReset(sequelize),
    SessionRecord: defineSessionRecord(sequelize),
    Preset: definePreset(sequelize),
    PresetVersion: definePresetVersion(sequelize),
    PresetTag: definePresetTag(sequelize),
    ShareLink: defineShareLink(sequelize),
    AuditEntry: defineAuditEntry(sequelize),
    MailMessage: defineMailMessage(sequelize),
    MailSettings: defineMailSettings(sequelize),
    AssignedSweep: defineAssignedSweep(sequelize),
    AssignedPerson: defineAssignedPerson(sequelize),
    AssignedWork: defineAssignedWork(sequelize),
    HandIn: defineHandIn(sequelize),
    Review: defineReview(sequelize),
    Comment: defineComment(sequelize),
  };
  models.Membership.belongsTo(models.User, { as: 'user', foreignKey: 'userId' });
  models.Membership.belongsTo(models.Lab, { as: 'lab', foreignKey: 'labId' });
  models.Invitation.belongsTo(models.Lab, { as: 'lab', foreignKey: 'labId' });
  models.Invitation.belongsTo(models.User, { as: 'inviter', foreignKey: 'invitedById' });
  models.InvitationToken.belongsTo(models.Invitation, { as: 'invitation', foreignKey: 'invitationId' });
  models.Preset.belongsTo(models.User, { as: 'owner', foreignKey: 'ownerId' });
  models.Preset.belongsTo(models.Lab, { as: 'lab', foreignKey: 'labId' });
  models.PresetVersion.belongsTo(models.User, { as: 'author', foreignKey: 'authorId' });
  models.AssignedSweep.belongsTo(models.Lab, { as: 'lab', foreignKey: 'labId' });
  models.AssignedPerson.belongsTo(models.AssignedSweep, { as: 'assigned', foreignKey: 'assignedId' });
  models.HandIn.hasOne(models.Review, { as: 'review', foreignKey: 'handInId' });
  return models;
}

/** The SQLite file behind its models. Read through `models`; change only through `change` or `write`. */
export class Database {
  readonly sequelize: Sequelize;
  readonly models: ReturnType<typeof defineModels>;
  readonly queue = new TransactionQueue();
  /** Its texts are what the test of query plans looks at. */
  readonly reader: Reader;

  constructor(path: string) {
    this.sequelize = connectSqlite(path);
    this.reader = new Reader(path);
    this.models = defineModels(this.sequelize);
  }

  /** Rows as they are, without models: within a change with its transaction, else beside all changes. */
  read<Row extends object>(text: string, values: ReadValues, transaction?: Transaction): Promise<Row[]> {
    if (transaction === undefined) return this.reader.all<Row>(text, values);
    return this.sequelize.query<Row>(text, { bind: { ...values }, transaction, type: QueryTypes.SELECT });
  }

  /** Runs `work` in a transaction of its own: all of it happens, or none. Give the transaction to each query. */
  change<Result>(work: (transaction: Transaction) => Promise<Result>): Promise<Result> {
    return this.queue.run(async () => {
      try {
        return await this.sequelize.transaction((transaction) => work(transaction));
      } catch (error) {
        await replaceWriter(this.sequelize);
        throw error;
      }
    });
  }

  /** Runs one statement that changes something, outside a transaction but never beside one. */
  write<Result>(statement: () => Promise<Result>): Promise<Result> {
    return this.queue.run(statement);
  }

  async close(): Promise<void> {
    await this.queue.idle();
    await this.reader.close();
    await this.sequelize.close();
  }
}
