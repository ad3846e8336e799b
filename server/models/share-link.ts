import {
  DataTypes,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Model,
  type Sequelize,
} from 'sequelize';

import type { LinkAccess } from '@/contract/presets';

/** A link that opens a preset without an account; the token itself is known to its holders alone. */
export interface ShareLink extends Model<InferAttributes<ShareLink>, InferCreationAttributes<ShareLink>> {
  id: string;
  presetId: string;
  tokenHash: string;
  label: string;
  createdById: string;
  createdAt: Date;
  revokedAt: CreationOptional<Date | null>;
  opened: CreationOptional<number>;
  /** When it ends by itself; null for never. */
  expiresAt: CreationOptional<Date | null>;
  access: CreationOptional<LinkAccess>;
  lastOpenedAt: CreationOptional<Date | null>;
}

export function defineShareLink(sequelize: Sequelize) {
  return sequelize.define<ShareLink>(
    'ShareLink',
    {
      id: { type: DataTypes.STRING, primaryKey: true },
      presetId: { type: DataTypes.STRING, allowNull: false },
      tokenHash: { type: DataTypes.STRING, allowNull: false },
      label: { type: DataTypes.STRING, allowNull: false },
      createdById: { type: DataTypes.STRING, allowNull: false },
      createdAt: { type: DataTypes.DATE, allowNull: false },
      revokedAt: { type: DataTypes.DATE },
      opened: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
      expiresAt: { type: DataTypes.DATE },
      access: { type: DataTypes.STRING, allowNull: false, defaultValue: 'copy' },
      lastOpenedAt: { type: DataTypes.DATE },
    },
    { tableName: 'share_links', timestamps: false },
  );
}
