import {
  DataTypes,
  Model,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize';
import { tableOptions } from './columns.ts';

/** The last number given to a calibration record of a site in a year. */
export class CalibrationCounter extends Model<
  InferAttributes<CalibrationCounter>,
  InferCreationAttributes<CalibrationCounter>
> {
  declare siteId: number;
  declare year: number;
  declare lastNumber: number;
}

export function initCalibrationCounter(sequelize: Sequelize): void {
  CalibrationCounter.init(
    {
      siteId: { type: DataTypes.INTEGER, primaryKey: true },
      year: { type: DataTypes.INTEGER, primaryKey: true },
      lastNumber: DataTypes.INTEGER,
    },
    tableOptions(sequelize, 'calibration_counters'),
  );
}
