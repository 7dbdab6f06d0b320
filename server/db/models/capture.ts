import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import {
  captureSources,
  captureSteps,
  type CaptureSource,
  type CaptureStep,
} from '../../../shared/contracts/vocabulary.ts';
import { identity, oneOf, tableOptions } from './columns.ts';
import type { CaptureExclusion } from './capture-exclusion.ts';

/** One captured reading, with the cell constant the device multiplied with. Never changed; see CaptureExclusion. */
export class Capture extends Model<InferAttributes<Capture>, InferCreationAttributes<Capture>> {
  declare id: CreationOptional<number>;
  declare key: string;
  declare step: CaptureStep;
  declare position: number;
  declare source: CaptureSource;
  declare conductivityUsCm: number;
  declare temperatureC: number;
  declare referenceTemperatureC: number | null;
  declare referenceConductivityUsCm: number | null;
  declare cellConstantPerCm: number;
  declare isStable: boolean;
  declare isConfirmed: CreationOptional<boolean>;
  declare boot: string | null;
  declare n: number | null;
  declare capturedAt: Date;
  declare receivedAt: Date;
  declare clockOffsetMs: number | null;
  declare calibrationId: number;
  declare deviceId: number | null;
  declare userId: number;

  declare exclusion?: NonAttribute<CaptureExclusion | null>;
}

export function initCapture(sequelize: Sequelize): void {
  Capture.init(
    {
      id: identity(),
      key: DataTypes.UUID,
      step: oneOf(captureSteps),
      position: DataTypes.INTEGER,
      source: oneOf(captureSources),
      conductivityUsCm: DataTypes.DOUBLE,
      temperatureC: DataTypes.DOUBLE,
      referenceTemperatureC: DataTypes.DOUBLE,
      referenceConductivityUsCm: DataTypes.DOUBLE,
      cellConstantPerCm: DataTypes.DOUBLE,
      isStable: DataTypes.BOOLEAN,
      isConfirmed: DataTypes.BOOLEAN,
      boot: DataTypes.TEXT,
      n: DataTypes.BIGINT,
      capturedAt: DataTypes.DATE,
      receivedAt: DataTypes.DATE,
      clockOffsetMs: DataTypes.DOUBLE,
      calibrationId: DataTypes.INTEGER,
      deviceId: DataTypes.INTEGER,
      userId: DataTypes.INTEGER,
    },
    tableOptions(sequelize, 'captures'),
  );
}
