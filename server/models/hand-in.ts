import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  type Model,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';

import type { GivenFinding } from '@/contract/assigned-sweeps';

import type { Review } from './review';

/** What someone handed in: never changed and never deleted, which the database refuses too. */
export interface HandIn extends Model<InferAttributes<HandIn>, InferCreationAttributes<HandIn>> {
  id: string;
  assignedId: string;
  userId: string;
  name: string;
  /** 1, 2, ... of this person for this sweep. */
  number: number;
  /** The client's name for it, by which it is known again. */
  key: string;
  /** Document, range, findings, sweep and note as JSON: what `code` is the digest of. */
  frozen: string;
  /** The findings once more, for tables that need nothing else. */
  findings: GivenFinding[];
  code: string;
  late: boolean;
  handedInAt: Date;
  review?: NonAttribute<Review | null>;
}

const refuse = () => {
  throw new Error('What was handed in never changes.');
};

export function defineHandIn(sequelize: Sequelize) {
  return sequelize.define<HandIn>(
    'HandIn',
    {
      id: { type: DataTypes.STRING, primaryKey: true },
      assignedId: { type: DataTypes.STRING, allowNull: false },
      userId: { type: DataTypes.STRING, allowNull: false },
      name: { type: DataTypes.STRING, allowNull: false },
      number: { type: DataTypes.INTEGER, allowNull: false },
      key: { type: DataTypes.STRING, allowNull: false },
      frozen: { type: DataTypes.TEXT, allowNull: false },
      findings: { type: DataTypes.JSON, allowNull: false },
      code: { type: DataTypes.STRING, allowNull: false },
      late: { type: DataTypes.BOOLEAN, allowNull: false },
      handedInAt: { type: DataTypes.DATE, allowNull: false },
    },
    {
      tableName: 'hand_ins',
      timestamps: false,
      hooks: {
        beforeUpdate: refuse,
        beforeBulkUpdate: refuse,
        beforeDestroy: refuse,
        beforeBulkDestroy: refuse,
      },
    },
  );
}
