import {
  DataTypes,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Model,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';

import type { Role } from '@/contract/rights';
import type { Lab } from './lab';
import type { User } from './user';

/** Someone asked by mail to join a lab. Of those that nobody has answered there is one a lab and address. */
export interface Invitation extends Model<InferAttributes<Invitation>, InferCreationAttributes<Invitation>> {
  id: string;
  labId: string;
  email: string;
  role: Role;
  invitedById: string | null;
  /** How often it was mailed. */
  sends: number;
  createdAt: Date;
  expiresAt: Date;
  acceptedAt: CreationOptional<Date | null>;
  declinedAt: CreationOptional<Date | null>;
  withdrawnAt: CreationOptional<Date | null>;
  lab?: NonAttribute<Lab>;
  inviter?: NonAttribute<User | null>;
}

export function defineInvitation(sequelize: Sequelize) {
  return sequelize.define<Invitation>(
    'Invitation',
    {
      id: { type: DataTypes.STRING, primaryKey: true },
      labId: { type: DataTypes.STRING, allowNull: false },
      email: { type: DataTypes.STRING, allowNull: false },
      role: { type: DataTypes.STRING, allowNull: false },
      invitedById: { type: DataTypes.STRING },
      sends: { type: DataTypes.INTEGER, allowNull: false },
      createdAt: { type: DataTypes.DATE, allowNull: false },
      expiresAt: { type: DataTypes.DATE, allowNull: false },
      acceptedAt: { type: DataTypes.DATE },
      declinedAt: { type: DataTypes.DATE },
      withdrawnAt: { type: DataTypes.DATE },
    },
    { tableName: 'invitations', timestamps: false },
  );
}
