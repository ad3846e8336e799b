import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  type Model,
  type Sequelize,
} from 'sequelize';

export interface Lab extends Model<InferAttributes<Lab>, InferCreationAttributes<Lab>> {
  id: string;
  name: string;
  createdAt: Date;
}

export function defineLab(sequelize: Sequelize) {
  return sequelize.define<Lab>(
    'Lab',
    {
      id: { type: DataTypes.STRING, primaryKey: true },
      name: { type: DataTypes.STRING, allowNull: false },
      createdAt: { type: DataTypes.DATE, allowNull: false },
    },
    { tableName: 'labs', timestamps: false },
  );
}
