import {
  DataTypes,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Model,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';

import { ROLES, type Role } from '@/contract/rights';
import type { Lab } from './lab';
import type { User } from './user';

export interface Membership extends Model<InferAttributes<Membership>, InferCreationAttributes<Membership>> {
  userId: string;
  labId: string;
  role: Role;
  /** Null for members of before it was kept. */
  joinedAt: CreationOptional<Date | null>;
  user?: NonAttribute<User>;
  lab?: NonAttribute<Lab>;
}

export function defineMembership(sequelize: Sequelize) {
  return sequelize.define<Membership>(
    'Membership',
    {
      userId: { type: DataTypes.STRING, primaryKey: true },
      labId: { type: DataTypes.STRING, primaryKey: true },
      role: { type: DataTypes.STRING, allowNull: false, validate: { isIn: [[...ROLES]] } },
      joinedAt: { type: DataTypes.DATE },
    },
    { tableName: 'memberships', timestamps: false },
  );
}
