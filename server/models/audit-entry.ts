import {
  DataTypes,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Model,
  type Sequelize,
} from 'sequelize';

import type { AuditAction } from '@/contract/audit';

/** Who did what and when; the file itself refuses to change or delete one. */
export interface AuditEntry extends Model<InferAttributes<AuditEntry>, InferCreationAttributes<AuditEntry>> {
  id: CreationOptional<number>;
  at: Date;
  /** Null for a visitor without an account and for the server itself. */
  actorId: string | null;
  /** As it was then. */
  actorName: string;
  action: AuditAction;
  labId: string | null;
  subject: string;
  details: Record<string, string | number>;
}

export function defineAuditEntry(sequelize: Sequelize) {
  return sequelize.define<AuditEntry>(
    'AuditEntry',
    {
      id: { type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true },
      at: { type: DataTypes.DATE, allowNull: false },
      actorId: { type: DataTypes.STRING },
      actorName: { type: DataTypes.STRING, allowNull: false },
      action: { type: DataTypes.STRING, allowNull: false },
      labId: { type: DataTypes.STRING },
      subject: { type: DataTypes.STRING, allowNull: false },
      details: { type: DataTypes.JSON, allowNull: false },
    },
    { tableName: 'audit_entries', timestamps: false },
  );
}
