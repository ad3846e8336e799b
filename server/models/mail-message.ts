import {
  DataTypes,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Model,
  type Sequelize,
} from 'sequelize';

import type { MailKind } from '@/contract/mail';

/** A passage of a message: words, or an address to open with what it is for. */
export type MailPassage = { readonly text: string } | { readonly label: string; readonly url: string };

/** What a message says; text and HTML are made from it when it is sent. */
export interface MailContent {
  readonly subject: string;
  /** Name in the greeting; empty where none is known. */
  readonly name: string;
  readonly passages: readonly MailPassage[];
}

export type MailState = 'waiting' | 'sent' | 'given up' | 'withheld' | 'too late';

/** One message to one address. Its content, which may hold links that open things, goes once it is settled. */
export interface MailMessage extends Model<
  InferAttributes<MailMessage>,
  InferCreationAttributes<MailMessage>
> {
  id: string;
  /** Names what the message is about, so that saying it twice sends it once. */
  idempotencyKey: string;
  kind: MailKind;
  address: string;
  /** The person whose act sent it, for limits; null for the server's own. */
  senderId: string | null;
  content: MailContent | null;
  state: MailState;
  attempts: CreationOptional<number>;
  /** When it may be sent next. A claim moves it on by the length of its lease. */
  dueAt: Date;
  /** Name of the claim under which it is being sent. */
  claim: CreationOptional<string | null>;
  /** Id of the first of the messages that go out as one. */
  bundleId: CreationOptional<string | null>;
  /** When its links stop working; it is not sent after that. */
  expiresAt: Date | null;
  lastError: CreationOptional<string>;
  createdAt: Date;
  settledAt: CreationOptional<Date | null>;
}

export function defineMailMessage(sequelize: Sequelize) {
  return sequelize.define<MailMessage>(
    'MailMessage',
    {
      id: { type: DataTypes.STRING, primaryKey: true },
      idempotencyKey: { type: DataTypes.STRING, allowNull: false },
      kind: { type: DataTypes.STRING, allowNull: false },
      address: { type: DataTypes.STRING, allowNull: false },
      senderId: { type: DataTypes.STRING },
      content: { type: DataTypes.JSON },
      state: { type: DataTypes.STRING, allowNull: false },
      attempts: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
      dueAt: { type: DataTypes.DATE, allowNull: false },
      claim: { type: DataTypes.STRING },
      bundleId: { type: DataTypes.STRING },
      expiresAt: { type: DataTypes.DATE },
      lastError: { type: DataTypes.TEXT, allowNull: false, defaultValue: '' },
      createdAt: { type: DataTypes.DATE, allowNull: false },
      settledAt: { type: DataTypes.DATE },
    },
    { tableName: 'mail_messages', timestamps: false },
  );
}
