import {
  DataTypes,
  Model,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize';
import { tableOptions } from './columns.ts';

/** Ten minutes of one probe's readings. */
export class ReadingRollup extends Model<
  InferAttributes<ReadingRollup>,
  InferCreationAttributes<ReadingRollup>
> {
  declare probeId: number;
  declare bucketAt: Date;
  declare readingCount: number;
  declare conductivityMinUsCm: number | null;
  declare conductivityMaxUsCm: number | null;
  declare conductivityMeanUsCm: number | null;
  declare temperatureMeanC: number | null;
}

export function initReadingRollup(sequelize: Sequelize): void {
  ReadingRollup.init(
    {
      probeId: { type: DataTypes.INTEGER, primaryKey: true },
      bucketAt: { type: DataTypes.DATE, primaryKey: true },
      readingCount: DataTypes.INTEGER,
      conductivityMinUsCm: DataTypes.DOUBLE,
      conductivityMaxUsCm: DataTypes.DOUBLE,
      conductivityMeanUsCm: DataTypes.DOUBLE,
      temperatureMeanC: DataTypes.DOUBLE,
    },
    tableOptions(sequelize, 'reading_rollups'),
  );
}
