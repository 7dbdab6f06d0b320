import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import type { Calibration as CalibrationOnWire, Judgement } from '../../../shared/contracts/calibrations.ts';
import {
  calibrationStatuses,
  decisionRules,
  type CalibrationStatus,
  type DecisionRule,
} from '../../../shared/contracts/vocabulary.ts';
import { identity, oneOf, tableOptions, versionColumn } from './columns.ts';
import type { Probe } from './probe.ts';
import type { Point } from './point.ts';
import type { Site } from './site.ts';
import type { Procedure } from './procedure.ts';
import type { Standard } from './standard.ts';
import type { Bottle } from './bottle.ts';
import type { Instrument } from './instrument.ts';
import type { User } from './user.ts';
import type { CalibrationStep } from './calibration-step.ts';
import type { Capture } from './capture.ts';
import type { Signature } from './signature.ts';

type Plan = CalibrationOnWire['plan'];
/** Who answered for an unusable lot; the name as it was then. */
interface Override {
  byUserId: number;
  by: string;
  reason: string;
}

/** A calibration run: fixed at its start in what it is for, and frozen whole by its signature. */
export class Calibration extends Model<InferAttributes<Calibration>, InferCreationAttributes<Calibration>> {
  declare id: CreationOptional<number>;
  declare key: string;
  declare number: string | null;
  declare status: CalibrationStatus;
  declare tolerancePercent: number;
  declare decisionRule: DecisionRule;
  declare cellConstantBeforePerCm: number;
  declare cellConstantAfterPerCm: number | null;
  declare permitNumber: string | null;
  declare override: Override | null;
  declare plan: Plan;
  declare judgement: Judgement;
  declare record: Record<string, unknown> | null;
  declare recordHash: string | null;
  declare startedAt: Date;
  declare stoppedAt: Date | null;
  declare stoppedReason: string | null;
  declare signedAt: Date | null;
  declare approvedAt: Date | null;
  declare effectiveAt: Date | null;
  declare dueOn: string | null;
  declare receivedAt: CreationOptional<Date>;
  declare version: CreationOptional<number>;
  declare probeId: number;
  declare pointId: number;
  declare siteId: number;
  declare procedureId: number;
  declare standardId: number;
  declare bottleId: number | null;
  declare secondStandardId: number | null;
  declare thermometerId: number | null;
  declare holdId: number | null;
  declare performerId: number;
  declare amendsId: number | null;

  declare probe?: NonAttribute<Probe>;
  declare point?: NonAttribute<Point>;
  declare site?: NonAttribute<Site>;
  declare procedure?: NonAttribute<Procedure>;
  declare standard?: NonAttribute<Standard>;
  declare bottle?: NonAttribute<Bottle | null>;
  declare secondStandard?: NonAttribute<Standard | null>;
  declare thermometer?: NonAttribute<Instrument | null>;
  declare performer?: NonAttribute<User>;
  declare steps?: NonAttribute<CalibrationStep[]>;
  declare captures?: NonAttribute<Capture[]>;
  declare signatures?: NonAttribute<Signature[]>;
}

export function initCalibration(sequelize: Sequelize): void {
  Calibration.init(
    {
      id: identity(),
      key: DataTypes.UUID,
      number: DataTypes.TEXT,
      status: oneOf(calibrationStatuses),
      tolerancePercent: DataTypes.DOUBLE,
      decisionRule: oneOf(decisionRules),
      cellConstantBeforePerCm: DataTypes.DOUBLE,
      cellConstantAfterPerCm: DataTypes.DOUBLE,
      permitNumber: DataTypes.TEXT,
      override: DataTypes.JSONB,
      plan: DataTypes.JSONB,
      judgement: DataTypes.JSONB,
      record: DataTypes.JSONB,
      recordHash: DataTypes.CHAR(64),
      startedAt: DataTypes.DATE,
      stoppedAt: DataTypes.DATE,
      stoppedReason: DataTypes.TEXT,
      signedAt: DataTypes.DATE,
      approvedAt: DataTypes.DATE,
      effectiveAt: DataTypes.DATE,
      dueOn: DataTypes.DATEONLY,
      receivedAt: DataTypes.DATE,
      version: versionColumn(),
      probeId: DataTypes.INTEGER,
      pointId: DataTypes.INTEGER,
      siteId: DataTypes.INTEGER,
      procedureId: DataTypes.INTEGER,
      standardId: DataTypes.INTEGER,
      bottleId: DataTypes.INTEGER,
      secondStandardId: DataTypes.INTEGER,
      thermometerId: DataTypes.INTEGER,
      holdId: DataTypes.INTEGER,
      performerId: DataTypes.INTEGER,
      amendsId: DataTypes.INTEGER,
    },
    { ...tableOptions(sequelize, 'calibrations'), version: true },
  );
}
