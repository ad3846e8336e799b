import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  type Model,
  type Sequelize,
} from 'sequelize';

/** A sign-up whose mailed link has not been followed yet; each carries its own name and password. */
export interface PendingAccount extends Model<
  InferAttributes<PendingAccount>,
  InferCreationAttributes<PendingAccount>
> {
  tokenHash: string;
  name: string;
  email: string;
  passwordHash: string;
  expiresAt: Date;
}

export function definePendingAccount(sequelize: Sequelize) {
  return sequelize.define<PendingAccount>(
    'PendingAccount',
    {
      tokenHash: { type: DataTypes.STRING, primaryKey: true },
      name: { type: DataTypes.STRING, allowNull: false },
      email: { type: DataTypes.STRING, allowNull: false },
      passwordHash: { type: DataTypes.STRING, allowNull: false },
      expiresAt: { type: DataTypes.DATE, allowNull: false },
    },
    { tableName: 'pending_accounts', timestamps: false },
  );
}
