import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  type Model,
  type Sequelize,
} from 'sequelize';

/** A mailed link for a new password: kept hashed, deleted when used, refused once expired. */
export interface PasswordReset extends Model<
  InferAttributes<PasswordReset>,
  InferCreationAttributes<PasswordReset>
> {
  tokenHash: string;
  userId: string;
  expiresAt: Date;
}

export function definePasswordReset(sequelize: Sequelize) {
  return sequelize.define<PasswordReset>(
    'PasswordReset',
    {
      tokenHash: { type: DataTypes.STRING, primaryKey: true },
      userId: { type: DataTypes.STRING, allowNull: false },
      expiresAt: { type: DataTypes.DATE, allowNull: false },
    },
    { tableName: 'password_resets', timestamps: false },
  );
}
