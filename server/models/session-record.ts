import {
  DataTypes,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Model,
  type Sequelize,
} from 'sequelize';

/** One signed-in browser. `sid` is the hash of the cookie's value; `publicId` may be shown and named. */
export interface SessionRecord extends Model<
  InferAttributes<SessionRecord>,
  InferCreationAttributes<SessionRecord>
> {
  sid: string;
  publicId: string;
  userId: string;
  agent: string;
  data: string;
  expires: Date;
  createdAt: CreationOptional<Date>;
  lastSeenAt: CreationOptional<Date>;
}

export const SESSION_MODEL = 'SessionRecord';

export function defineSessionRecord(sequelize: Sequelize) {
  return sequelize.define<SessionRecord>(
    SESSION_MODEL,
    {
      sid: { type: DataTypes.STRING, primaryKey: true },
      publicId: { type: DataTypes.STRING, allowNull: false },
      userId: { type: DataTypes.STRING, allowNull: false },
      agent: { type: DataTypes.STRING, allowNull: false },
      data: { type: DataTypes.TEXT, allowNull: false },
      expires: { type: DataTypes.DATE, allowNull: false },
      createdAt: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
      lastSeenAt: { type: DataTypes.DATE, allowNull: false, defaultValue: DataTypes.NOW },
    },
    { tableName: 'sessions', timestamps: false },
  );
}
