import {
  DataTypes,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Model,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';

import type { AssignedState, Freedom, Reference, WantedFinding } from '@/contract/assigned-sweeps';
import type { SweepRange } from '@/contract/kept-sweep';

import type { Lab } from './lab';

/** A sweep that a lab sets: what is asked, of whom it is not here, and what is expected. */
export interface AssignedSweep extends Model<
  InferAttributes<AssignedSweep>,
  InferCreationAttributes<AssignedSweep>
> {
  id: string;
  revision: number;
  labId: string;
  state: AssignedState;
  setById: string | null;
  setByName: string;
  presetId: string;
  presetTitle: string;
  presetVersion: number;
  /** The preset document as it was, known facts included: never sent to an assignee as it is. */
  document: string;
  title: string;
  brief: string;
  range: SweepRange;
  freedom: Freedom;
  wanted: WantedFinding[];
  reference: Reference;
  dueAt: Date | null;
  timeZone: string;
  createdAt: Date;
  openedAt: CreationOptional<Date | null>;
  closedAt: CreationOptional<Date | null>;
  lab?: NonAttribute<Lab>;
}

export function defineAssignedSweep(sequelize: Sequelize) {
  return sequelize.define<AssignedSweep>(
    'AssignedSweep',
    {
      id: { type: DataTypes.STRING, primaryKey: true },
      revision: { type: DataTypes.INTEGER, allowNull: false },
      labId: { type: DataTypes.STRING, allowNull: false },
      state: { type: DataTypes.STRING, allowNull: false },
      setById: { type: DataTypes.STRING },
      setByName: { type: DataTypes.STRING, allowNull: false },
      presetId: { type: DataTypes.STRING, allowNull: false },
      presetTitle: { type: DataTypes.STRING, allowNull: false },
      presetVersion: { type: DataTypes.INTEGER, allowNull: false },
      document: { type: DataTypes.TEXT, allowNull: false },
      title: { type: DataTypes.STRING, allowNull: false },
      brief: { type: DataTypes.TEXT, allowNull: false },
      range: { type: DataTypes.JSON, allowNull: false },
      freedom: { type: DataTypes.JSON, allowNull: false },
      wanted: { type: DataTypes.JSON, allowNull: false },
      reference: { type: DataTypes.JSON, allowNull: false },
      dueAt: { type: DataTypes.DATE },
      timeZone: { type: DataTypes.STRING, allowNull: false },
      createdAt: { type: DataTypes.DATE, allowNull: false },
      openedAt: { type: DataTypes.DATE },
      closedAt: { type: DataTypes.DATE },
    },
    { tableName: 'assigned_sweeps', timestamps: false },
  );
}
