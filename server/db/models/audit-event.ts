import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize';
import { oneOf, tableOptions } from './columns.ts';

/**
 * One entry of the audit trail, chained to the one before by hash. The audit service alone adds them; the
 * database refuses every change.
 */
export class AuditEvent extends Model<InferAttributes<AuditEvent>, InferCreationAttributes<AuditEvent>> {
  declare sequence: number;
  declare capturedAt: Date;
  declare receivedAt: Date;
  declare actorKind: 'user' | 'device' | 'system';
  declare actorId: number | null;
  declare actorName: string;
  declare actingRole: string | null;
  declare action: string;
  declare objectKind: string;
  declare objectId: string | null;
  declare objectVersion: number | null;
  declare siteId: number | null;
  declare oldValue: unknown;
  declare newValue: unknown;
  declare reason: string | null;
  declare source: CreationOptional<Record<string, unknown>>;
  declare previousHash: string;
  declare hash: string;
}

export function initAuditEvent(sequelize: Sequelize): void {
  AuditEvent.init(
    {
      sequence: { type: DataTypes.BIGINT, primaryKey: true },
      capturedAt: DataTypes.DATE,
      receivedAt: DataTypes.DATE,
      actorKind: oneOf(['user', 'device', 'system']),
      actorId: DataTypes.INTEGER,
      actorName: DataTypes.TEXT,
      actingRole: DataTypes.TEXT,
      action: DataTypes.TEXT,
      objectKind: DataTypes.TEXT,
      objectId: DataTypes.TEXT,
      objectVersion: DataTypes.INTEGER,
      siteId: DataTypes.INTEGER,
      oldValue: DataTypes.JSONB,
      newValue: DataTypes.JSONB,
      reason: DataTypes.TEXT,
      source: DataTypes.JSONB,
      previousHash: DataTypes.CHAR(64),
      hash: DataTypes.CHAR(64),
    },
    tableOptions(sequelize, 'audit_events'),
  );
}
