import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize';
import type { Criteria } from '../../../shared/contracts/procedures.ts';
import { type ProbeKind, type RunStep } from '../../../shared/contracts/vocabulary.ts';
import { identity, tableOptions } from './columns.ts';

/** One version of how a run is done. Never changed; a newer version sets `replacedAt`. */
export class Procedure extends Model<InferAttributes<Procedure>, InferCreationAttributes<Procedure>> {
  declare id: CreationOptional<number>;
  declare code: string;
  declare version: number;
  declare name: string;
  declare probeKinds: ProbeKind[];
  declare steps: RunStep[];
  declare criteria: Criteria;
  declare effectiveFrom: Date;
  declare replacedAt: Date | null;
  declare changeReason: string | null;
  declare createdAt: CreationOptional<Date>;
  declare createdBy: number | null;
}

export function initProcedure(sequelize: Sequelize): void {
  Procedure.init(
    {
      id: identity(),
      code: DataTypes.TEXT,
      version: DataTypes.INTEGER,
      name: DataTypes.TEXT,
      probeKinds: DataTypes.ARRAY(DataTypes.TEXT),
      steps: DataTypes.ARRAY(DataTypes.TEXT),
      criteria: DataTypes.JSONB,
      effectiveFrom: DataTypes.DATE,
      replacedAt: DataTypes.DATE,
      changeReason: DataTypes.TEXT,
      createdAt: DataTypes.DATE,
      createdBy: DataTypes.INTEGER,
    },
    tableOptions(sequelize, 'procedures'),
  );
}
