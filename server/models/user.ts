import {
  DataTypes,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Model,
  type Sequelize,
} from 'sequelize';

export interface User extends Model<InferAttributes<User>, InferCreationAttributes<User>> {
  id: string;
  name: string;
  email: string;
  passwordHash: string;
  /** An invented person of the demo lab; cannot sign in without DEMO=1. */
  demo: CreationOptional<boolean>;
  createdAt: Date;
}

export function defineUser(sequelize: Sequelize) {
  return sequelize.define<User>(
    'User',
    {
      id: { type: DataTypes.STRING, primaryKey: true },
      name: { type: DataTypes.STRING, allowNull: false },
      email: { type: DataTypes.STRING, allowNull: false },
      passwordHash: { type: DataTypes.STRING, allowNull: false },
      demo: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: false },
      createdAt: { type: DataTypes.DATE, allowNull: false },
    },
    { tableName: 'users', timestamps: false },
  );
}
