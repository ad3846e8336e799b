import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  type Model,
  type Sequelize,
} from 'sequelize';

export interface PresetTag extends Model<InferAttributes<PresetTag>, InferCreationAttributes<PresetTag>> {
  presetId: string;
  tag: string;
}

export function definePresetTag(sequelize: Sequelize) {
  return sequelize.define<PresetTag>(
    'PresetTag',
    {
      presetId: { type: DataTypes.STRING, primaryKey: true },
      tag: { type: DataTypes.STRING, primaryKey: true },
    },
    { tableName: 'preset_tags', timestamps: false },
  );
}
