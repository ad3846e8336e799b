import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  type Model,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';

import type { WorkState } from '@/contract/assigned-sweeps';

import type { AssignedSweep } from './assigned-sweep';

/** Someone whom a sweep is for, and where they stand with it. */
export interface AssignedPerson extends Model<
  InferAttributes<AssignedPerson>,
  InferCreationAttributes<AssignedPerson>
> {
  assignedId: string;
  userId: string;
  /** As it was when they were last seen with it. */
  name: string;
  state: WorkState;
  addedAt: Date;
  assigned?: NonAttribute<AssignedSweep>;
}

export function defineAssignedPerson(sequelize: Sequelize) {
  return sequelize.define<AssignedPerson>(
    'AssignedPerson',
    {
      assignedId: { type: DataTypes.STRING, primaryKey: true },
      userId: { type: DataTypes.STRING, primaryKey: true },
      name: { type: DataTypes.STRING, allowNull: false },
      state: { type: DataTypes.STRING, allowNull: false },
      addedAt: { type: DataTypes.DATE, allowNull: false },
    },
    { tableName: 'assigned_people', timestamps: false },
  );
}
