import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import type { Preparation } from '../../../shared/contracts/preparations.ts';
import {
  standardBases,
  standardMedia,
  standardStates,
  type StandardBasis,
  type StandardMedium,
  type StandardState,
} from '../../../shared/contracts/vocabulary.ts';
import { identity, oneOf, tableOptions, versionColumn } from './columns.ts';
import type { Check } from './check.ts';

/** A lot of reference solution. What the certificate says never changes after release; the state does. */
export class Standard extends Model<InferAttributes<Standard>, InferCreationAttributes<Standard>> {
  declare id: CreationOptional<number>;
  declare code: string;
  declare producer: string;
  declare product: string;
  declare medium: StandardMedium;
  declare basis: StandardBasis;
  declare nominal: number | null;
  declare certifiedConductivityUsCm: number | null;
  declare referenceTemperatureC: CreationOptional<number>;
  declare expandedUncertaintyUsCm: number | null;
  declare coverageFactor: number | null;
  declare temperatureTable: unknown;
  declare traceability: CreationOptional<string>;
  declare isInHouse: CreationOptional<boolean>;
  declare issuedOn: string;
  declare expiresOn: string;
  declare state: StandardState;
  declare stateReason: string | null;
  declare stateChangedAt: Date | null;
  declare createdAt: CreationOptional<Date>;
  declare openedLifeDays: CreationOptional<number | null>;
  declare storage: CreationOptional<string>;
  declare coverageProbabilityPercent: CreationOptional<number | null>;
  /** How an in-house lot was made: readings, value and budget; written once, with the lot. */
  declare preparation: CreationOptional<Preparation | null>;
  declare version: CreationOptional<number>;
  declare certificateId: CreationOptional<number | null>;

  declare checks?: NonAttribute<Check[]>;
}

export function initStandard(sequelize: Sequelize): void {
  Standard.init(
    {
      id: identity(),
      code: DataTypes.TEXT,
      producer: DataTypes.TEXT,
      product: DataTypes.TEXT,
      medium: oneOf(standardMedia),
      basis: oneOf(standardBases),
      nominal: DataTypes.DOUBLE,
      certifiedConductivityUsCm: DataTypes.DOUBLE,
      referenceTemperatureC: DataTypes.DOUBLE,
      expandedUncertaintyUsCm: DataTypes.DOUBLE,
      coverageFactor: DataTypes.DOUBLE,
      temperatureTable: DataTypes.JSONB,
      traceability: DataTypes.TEXT,
      isInHouse: DataTypes.BOOLEAN,
      issuedOn: DataTypes.DATEONLY,
      expiresOn: DataTypes.DATEONLY,
      state: oneOf(standardStates),
      stateReason: DataTypes.TEXT,
      stateChangedAt: DataTypes.DATE,
      createdAt: DataTypes.DATE,
      openedLifeDays: DataTypes.INTEGER,
      storage: DataTypes.TEXT,
      coverageProbabilityPercent: DataTypes.DOUBLE,
      preparation: DataTypes.JSONB,
      version: versionColumn(),
      certificateId: DataTypes.INTEGER,
    },
    { ...tableOptions(sequelize, 'standards'), version: true },
  );
}
