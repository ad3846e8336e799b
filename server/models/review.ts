import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  type Model,
  type Sequelize,
} from 'sequelize';

import type { Judgement, Remark } from '@/contract/assigned-sweeps';

export type Outcome = 'agreed' | 'differs' | 'sent back';

/** What reviewers say to a hand-in. Until it has an outcome it is theirs alone. */
export interface Review extends Model<InferAttributes<Review>, InferCreationAttributes<Review>> {
  handInId: string;
  revision: number;
  judgements: Record<string, Judgement>;
  remarks: Remark[];
  outcome: Outcome | null;
  note: string;
  byId: string;
  byName: string;
  at: Date;
}

export function defineReview(sequelize: Sequelize) {
  return sequelize.define<Review>(
    'Review',
    {
      handInId: { type: DataTypes.STRING, primaryKey: true },
      revision: { type: DataTypes.INTEGER, allowNull: false },
      judgements: { type: DataTypes.JSON, allowNull: false },
      remarks: { type: DataTypes.JSON, allowNull: false },
      outcome: { type: DataTypes.STRING },
      note: { type: DataTypes.TEXT, allowNull: false },
      byId: { type: DataTypes.STRING, allowNull: false },
      byName: { type: DataTypes.STRING, allowNull: false },
      at: { type: DataTypes.DATE, allowNull: false },
    },
    { tableName: 'reviews', timestamps: false },
  );
}
