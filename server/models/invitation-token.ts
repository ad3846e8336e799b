import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  type Model,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';

import type { Invitation } from './invitation';

/** A mailed link to an invitation, kept hashed; each message has its own. */
export interface InvitationToken extends Model<
  InferAttributes<InvitationToken>,
  InferCreationAttributes<InvitationToken>
> {
  tokenHash: string;
  invitationId: string;
  /** The one person for whom it opens it, though their account has another address. */
  forUserId: string | null;
  invitation?: NonAttribute<Invitation>;
}

export function defineInvitationToken(sequelize: Sequelize) {
  return sequelize.define<InvitationToken>(
    'InvitationToken',
    {
      tokenHash: { type: DataTypes.STRING, primaryKey: true },
      invitationId: { type: DataTypes.STRING, allowNull: false },
      forUserId: { type: DataTypes.STRING },
    },
    { tableName: 'invitation_tokens', timestamps: false },
  );
}
