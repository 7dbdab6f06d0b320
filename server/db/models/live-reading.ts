import {
  DataTypes,
  Model,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import {
  readingContexts,
  readingQualities,
  type ReadingContext,
  type ReadingFlag,
  type ReadingQuality,
} from '../../../shared/contracts/vocabulary.ts';
import { oneOf, tableOptions } from './columns.ts';
import type { Device } from './device.ts';
import type { Probe } from './probe.ts';

/** The newest reading of a probe by (boot, n). Written by ingest with SQL. */
export class LiveReading extends Model<InferAttributes<LiveReading>, InferCreationAttributes<LiveReading>> {
  declare probeId: number;
  declare boot: string;
  declare n: number;
  declare context: ReadingContext;
  declare conductivityUsCm: number | null;
  declare temperatureC: number | null;
  declare quality: ReadingQuality;
  declare flags: ReadingFlag[] | null;
  declare solution: string | null;
  declare at: Date;
  declare receivedAt: Date;
  declare deviceId: number;

  declare probe?: NonAttribute<Probe>;
  declare device?: NonAttribute<Device>;
}

export function initLiveReading(sequelize: Sequelize): void {
  LiveReading.init(
    {
      probeId: { type: DataTypes.INTEGER, primaryKey: true },
      boot: DataTypes.TEXT,
      n: DataTypes.BIGINT,
      context: oneOf(readingContexts),
      conductivityUsCm: DataTypes.DOUBLE,
      temperatureC: DataTypes.DOUBLE,
      quality: oneOf(readingQualities),
      flags: DataTypes.ARRAY(DataTypes.TEXT),
      solution: DataTypes.TEXT,
      at: DataTypes.DATE,
      receivedAt: DataTypes.DATE,
      deviceId: DataTypes.INTEGER,
    },
    tableOptions(sequelize, 'live_readings'),
  );
}
