import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import { identity, oneOf, tableOptions, versionColumn } from './columns.ts';
import type { DeviceBoot } from './device-boot.ts';
import type { Probe } from './probe.ts';

/**
 * The transmitter that speaks for a probe over MQTT; `name` is its user name there. One device per probe
 * is active (`revokedAt` null). `bootText` is the newest boot seen; ingest writes the live columns by SQL
 * without touching `version`.
 */
export class Device extends Model<InferAttributes<Device>, InferCreationAttributes<Device>> {
  declare id: CreationOptional<number>;
  declare name: string;
  declare secretHash: string;
  declare firmware: string | null;
  declare settingsHash: string | null;
  declare reportedCellConstantPerCm: number | null;
  declare readingIntervalS: number | null;
  declare clockOffsetMs: number | null;
  declare clockSource: string | null;
  declare duplicateCount: CreationOptional<number>;
  declare isOnline: CreationOptional<boolean>;
  declare onlineWhy: 'start' | 'planned' | 'lost' | null;
  declare bootText: string | null;
  declare stateAt: Date | null;
  declare lastSeenAt: Date | null;
  declare credentialsIssuedAt: Date;
  declare revokedAt: Date | null;
  declare createdAt: CreationOptional<Date>;
  declare version: CreationOptional<number>;
  declare probeId: number;

  declare probe?: NonAttribute<Probe>;
  declare boots?: NonAttribute<DeviceBoot[]>;
}

export function initDevice(sequelize: Sequelize): void {
  Device.init(
    {
      id: identity(),
      name: DataTypes.TEXT,
      secretHash: DataTypes.TEXT,
      firmware: DataTypes.TEXT,
      settingsHash: DataTypes.TEXT,
      reportedCellConstantPerCm: DataTypes.DOUBLE,
      readingIntervalS: DataTypes.DOUBLE,
      clockOffsetMs: DataTypes.DOUBLE,
      clockSource: DataTypes.TEXT,
      duplicateCount: DataTypes.BIGINT,
      isOnline: DataTypes.BOOLEAN,
      onlineWhy: oneOf(['start', 'planned', 'lost']),
      bootText: DataTypes.TEXT,
      stateAt: DataTypes.DATE,
      lastSeenAt: DataTypes.DATE,
      credentialsIssuedAt: DataTypes.DATE,
      revokedAt: DataTypes.DATE,
      createdAt: DataTypes.DATE,
      version: versionColumn(),
      probeId: DataTypes.INTEGER,
    },
    { ...tableOptions(sequelize, 'devices'), version: true },
  );
}
