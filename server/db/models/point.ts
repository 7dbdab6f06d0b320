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
  compensationModels,
  criticalities,
  decisionRules,
  displayUnits,
  intervalMethods,
  type CompensationModelName,
  type Criticality,
  type DecisionRule,
  type DisplayUnit,
  type HazardTag,
  type IntervalMethod,
} from '../../../shared/contracts/vocabulary.ts';
import { identity, oneOf, tableOptions, versionColumn } from './columns.ts';
import type { Area } from './area.ts';
import type { Assignment } from './assignment.ts';
import type { Hold } from './hold.ts';

/**
 * A measuring point. Requirements (limits, tolerance, decision rule, interval) belong here; history
 * belongs to the probe.
 */
export class Point extends Model<InferAttributes<Point>, InferCreationAttributes<Point>> {
  declare id: CreationOptional<number>;
  declare code: string;
  declare name: string;
  declare duty: string;
  declare medium: string;
  declare displayUnit: DisplayUnit;
  declare compensationModel: CompensationModelName;
  declare compensationCoefficientPercentPerK: number | null;
  declare referenceTemperatureC: CreationOptional<number>;
  declare lowLimitUsCm: number | null;
  declare highLimitUsCm: number | null;
  declare tolerancePercent: number;
  declare decisionRule: DecisionRule;
  declare intervalDays: number;
  declare intervalMethod: IntervalMethod;
  declare criticality: Criticality;
  declare hazardTags: CreationOptional<HazardTag[]>;
  declare controlNote: string | null;
  declare createdAt: CreationOptional<Date>;
  declare retiredAt: Date | null;
  declare version: CreationOptional<number>;
  declare areaId: number;

  declare area?: NonAttribute<Area>;
  declare assignments?: NonAttribute<Assignment[]>;
  declare holds?: NonAttribute<Hold[]>;
}

export function initPoint(sequelize: Sequelize): void {
  Point.init(
    {
      id: identity(),
      code: DataTypes.TEXT,
      name: DataTypes.TEXT,
      duty: DataTypes.TEXT,
      medium: DataTypes.TEXT,
      displayUnit: oneOf(displayUnits),
      compensationModel: oneOf(compensationModels),
      compensationCoefficientPercentPerK: DataTypes.DOUBLE,
      referenceTemperatureC: DataTypes.DOUBLE,
      lowLimitUsCm: DataTypes.DOUBLE,
      highLimitUsCm: DataTypes.DOUBLE,
      tolerancePercent: DataTypes.DOUBLE,
      decisionRule: oneOf(decisionRules),
      intervalDays: DataTypes.INTEGER,
      intervalMethod: oneOf(intervalMethods),
      criticality: oneOf(criticalities),
      hazardTags: DataTypes.ARRAY(DataTypes.TEXT),
      controlNote: DataTypes.TEXT,
      createdAt: DataTypes.DATE,
      retiredAt: DataTypes.DATE,
      version: versionColumn(),
      areaId: DataTypes.INTEGER,
    },
    { ...tableOptions(sequelize, 'points'), version: true },
  );
}
