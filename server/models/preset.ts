import {
  DataTypes,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Model,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';

import type { PresetSummary } from '@/contract/presets';
import type { Lab } from './lab';
import type { User } from './user';

/** What the library shows of a preset, kept beside its head version; the documents are in the versions. */
export interface Preset extends Model<InferAttributes<Preset>, InferCreationAttributes<Preset>> {
  id: string;
  /** Key of a preset that ships with the product; null for everyone's own. */
  starterKey: CreationOptional<string | null>;
  ownerId: string | null;
  labId: string | null;
  visibility: PresetSummary['visibility'];
  title: string;
  summary: string;
  /** The tags, one a line: for the search index and for showing; `PresetTag` is for filtering. */
  tagLines: string;
  populations: PresetSummary['populations'];
  headNumber: number;
  createdAt: Date;
  changedAt: Date;
  deletedAt: CreationOptional<Date | null>;
  owner?: NonAttribute<User | null>;
  lab?: NonAttribute<Lab | null>;
}

export function definePreset(sequelize: Sequelize) {
  return sequelize.define<Preset>(
    'Preset',
    {
      id: { type: DataTypes.STRING, primaryKey: true },
      starterKey: { type: DataTypes.STRING },
      ownerId: { type: DataTypes.STRING },
      labId: { type: DataTypes.STRING },
      visibility: { type: DataTypes.STRING, allowNull: false },
      title: { type: DataTypes.STRING, allowNull: false },
      summary: { type: DataTypes.TEXT, allowNull: false },
      tagLines: { type: DataTypes.TEXT, allowNull: false },
      populations: { type: DataTypes.JSON, allowNull: false },
      headNumber: { type: DataTypes.INTEGER, allowNull: false },
      createdAt: { type: DataTypes.DATE, allowNull: false },
      changedAt: { type: DataTypes.DATE, allowNull: false },
      deletedAt: { type: DataTypes.DATE },
    },
    { tableName: 'presets', timestamps: false },
  );
}
