import {
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  type Model,
  type Sequelize,
} from 'sequelize';

import type { MailKind, MailTiming } from '@/contract/mail';

/** What an address wants of mail. By address, so that people without an account can refuse it too. */
export interface MailSettings extends Model<
  InferAttributes<MailSettings>,
  InferCreationAttributes<MailSettings>
> {
  address: string;
  /** Only what was chosen; the rest is as the kind has it. */
  timings: Partial<Record<MailKind, MailTiming>>;
  digestHour: number;
  timeZone: string;
}

export function defineMailSettings(sequelize: Sequelize) {
  return sequelize.define<MailSettings>(
    'MailSettings',
    {
      address: { type: DataTypes.STRING, primaryKey: true },
      timings: { type: DataTypes.JSON, allowNull: false },
      digestHour: { type: DataTypes.INTEGER, allowNull: false },
      timeZone: { type: DataTypes.STRING, allowNull: false },
    },
    { tableName: 'mail_settings', timestamps: false },
  );
}
