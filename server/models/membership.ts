import {
  DataTypes,
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
    },
    { tableName: 'memberships', timestamps: false },
  );
}
