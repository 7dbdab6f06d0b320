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
  checkInvalidReasons,
  checkStages,
  decisionRules,
  outcomes,
  type CheckInvalidReason,
  type CheckStage,
  type DecisionRule,
  type Outcome,
} from '../../../shared/contracts/vocabulary.ts';
import { identity, oneOf, tableOptions } from './columns.ts';
import type { Device } from './device.ts';
import type { Point } from './point.ts';
import type { Probe } from './probe.ts';
import type { Standard } from './standard.ts';
import type { User } from './user.ts';

/** A comparison with a known solution, whole with its result, or not valid with the reason. Never changed. */
export class Check extends Model<InferAttributes<Check>, InferCreationAttributes<Check>> {
  declare id: CreationOptional<number>;
  declare stage: CheckStage;
  declare n: number | null;
  declare solution: string | null;
  declare isValid: boolean;
  declare invalidReason: CheckInvalidReason | null;
  declare conductivityUsCm: number | null;
  declare temperatureC: number | null;
  declare cellConstantPerCm: number | null;
  declare referenceUsCm: number | null;
  declare errorPercent: number | null;
  declare impliedCellConstantPerCm: number | null;
  declare expandedUncertaintyPercent: number | null;
  declare coverageFactor: number | null;
  declare tolerancePercent: number | null;
  declare decisionRule: DecisionRule | null;
  declare outcome: Outcome | null;
  declare probabilityOutside: number | null;
  declare acceptanceLimitPercent: number | null;
  declare budget: unknown;
  declare referenceSource: string | null;
  declare at: Date;
  declare receivedAt: CreationOptional<Date>;
  declare probeId: number;
  declare pointId: number | null;
  declare deviceId: number | null;
  declare bootId: number | null;
  declare standardId: number | null;
  declare performedByUserId: number | null;

  declare probe?: NonAttribute<Probe>;
  declare point?: NonAttribute<Point | null>;
  declare standard?: NonAttribute<Standard | null>;
  declare device?: NonAttribute<Device | null>;
  declare performer?: NonAttribute<User | null>;
}

export function initCheck(sequelize: Sequelize): void {
  Check.init(
    {
      id: identity(),
      stage: oneOf(checkStages),
      n: DataTypes.BIGINT,
      solution: DataTypes.TEXT,
      isValid: DataTypes.BOOLEAN,
      invalidReason: oneOf(checkInvalidReasons),
      conductivityUsCm: DataTypes.DOUBLE,
      temperatureC: DataTypes.DOUBLE,
      cellConstantPerCm: DataTypes.DOUBLE,
      referenceUsCm: DataTypes.DOUBLE,
      errorPercent: DataTypes.DOUBLE,
      impliedCellConstantPerCm: DataTypes.DOUBLE,
      expandedUncertaintyPercent: DataTypes.DOUBLE,
      coverageFactor: DataTypes.DOUBLE,
      tolerancePercent: DataTypes.DOUBLE,
      decisionRule: oneOf(decisionRules),
      outcome: oneOf(outcomes),
      probabilityOutside: DataTypes.DOUBLE,
      acceptanceLimitPercent: DataTypes.DOUBLE,
      budget: DataTypes.JSONB,
      referenceSource: DataTypes.TEXT,
      at: DataTypes.DATE,
      receivedAt: DataTypes.DATE,
      probeId: DataTypes.INTEGER,
      pointId: DataTypes.INTEGER,
      deviceId: DataTypes.INTEGER,
      bootId: DataTypes.INTEGER,
      standardId: DataTypes.INTEGER,
      performedByUserId: DataTypes.INTEGER,
    },
    tableOptions(sequelize, 'checks'),
  );
}
