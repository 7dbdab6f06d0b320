import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import { runSteps, type RunStep } from '../../../shared/contracts/vocabulary.ts';
import { identity, oneOf, tableOptions } from './columns.ts';
import type { User } from './user.ts';

/** A finished step of a run and what it recorded. Never changed. */
export class CalibrationStep extends Model<
  InferAttributes<CalibrationStep>,
  InferCreationAttributes<CalibrationStep>
> {
  declare id: CreationOptional<number>;
  declare key: string;
  declare step: RunStep;
  declare data: Record<string, unknown>;
  declare capturedAt: Date;
  declare receivedAt: Date;
  declare calibrationId: number;
  declare userId: number;

  declare user?: NonAttribute<User>;
}

export function initCalibrationStep(sequelize: Sequelize): void {
  CalibrationStep.init(
    {
      id: identity(),
      key: DataTypes.UUID,
      step: oneOf(runSteps),
      data: DataTypes.JSONB,
      capturedAt: DataTypes.DATE,
      receivedAt: DataTypes.DATE,
      calibrationId: DataTypes.INTEGER,
      userId: DataTypes.INTEGER,
    },
    tableOptions(sequelize, 'calibration_steps'),
  );
}
