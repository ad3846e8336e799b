import {
  DataTypes,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Model,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';

import type { User } from './user';

/** One save: never changed and never deleted, which the database refuses too. */
export interface PresetVersion extends Model<
  InferAttributes<PresetVersion>,
  InferCreationAttributes<PresetVersion>
> {
  presetId: string;
  number: number;
  /** The preset document as JSON. */
  document: string;
  note: string;
  authorId: string | null;
  restoredFrom: CreationOptional<number | null>;
  savedAt: Date;
  author?: NonAttribute<User | null>;
}

const refuse = () => {
  throw new Error('A saved version never changes: save a new one.');
};

export function definePresetVersion(sequelize: Sequelize) {
  return sequelize.define<PresetVersion>(
    'PresetVersion',
    {
      presetId: { type: DataTypes.STRING, primaryKey: true },
      number: { type: DataTypes.INTEGER, primaryKey: true },
      document: { type: DataTypes.TEXT, allowNull: false },
      note: { type: DataTypes.TEXT, allowNull: false },
      authorId: { type: DataTypes.STRING },
      restoredFrom: { type: DataTypes.INTEGER },
      savedAt: { type: DataTypes.DATE, allowNull: false },
    },
    {
      tableName: 'preset_versions',
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
