import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
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

/** One raw reading as the device sent it. Written by ingest with SQL; partitioned by month of `at`. */
export class Reading extends Model<InferAttributes<Reading>, InferCreationAttributes<Reading>> {
  declare deviceId: number;
  declare bootId: number;
  declare n: number;
  declare at: Date;
  declare context: ReadingContext;
  declare conductivityUsCm: number | null;
  declare temperatureC: number | null;
  declare conductanceUs: number | null;
  declare solution: string | null;
  declare quality: ReadingQuality;
  declare flags: ReadingFlag[] | null;
  declare isLate: CreationOptional<boolean>;
  declare extra: Record<string, unknown> | null;
  declare receivedAt: Date;
  declare probeId: number;
  declare settingsId: number | null;
}

export function initReading(sequelize: Sequelize): void {
  Reading.init(
    {
      deviceId: { type: DataTypes.INTEGER, primaryKey: true },
      bootId: { type: DataTypes.INTEGER, primaryKey: true },
      n: { type: DataTypes.BIGINT, primaryKey: true },
      at: { type: DataTypes.DATE, primaryKey: true },
      context: oneOf(readingContexts),
      conductivityUsCm: DataTypes.DOUBLE,
      temperatureC: DataTypes.DOUBLE,
      conductanceUs: DataTypes.DOUBLE,
      solution: DataTypes.TEXT,
      quality: oneOf(readingQualities),
      flags: DataTypes.ARRAY(DataTypes.TEXT),
      isLate: DataTypes.BOOLEAN,
      extra: DataTypes.JSONB,
      receivedAt: DataTypes.DATE,
      probeId: DataTypes.INTEGER,
      settingsId: DataTypes.INTEGER,
    },
    tableOptions(sequelize, 'readings'),
  );
}
