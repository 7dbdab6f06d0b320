import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import { cellConstantOrigins, type CellConstantOrigin } from '../../../shared/contracts/vocabulary.ts';
import { identity, oneOf, tableOptions } from './columns.ts';
import type { Probe } from './probe.ts';
import type { User } from './user.ts';

/** One value a probe's cell constant had, and since when. History: rows are added, never changed. */
export class CellConstant extends Model<
  InferAttributes<CellConstant>,
  InferCreationAttributes<CellConstant>
> {
  declare id: CreationOptional<number>;
  declare cellConstantPerCm: number;
  declare fromAt: Date;
  declare origin: CellConstantOrigin;
  declare reason: string | null;
  declare recordedAt: CreationOptional<Date>;
  declare probeId: number;
  declare userId: number | null;

  declare probe?: NonAttribute<Probe>;
  declare user?: NonAttribute<User | null>;
}

export function initCellConstant(sequelize: Sequelize): void {
  CellConstant.init(
    {
      id: identity(),
      cellConstantPerCm: DataTypes.DOUBLE,
      fromAt: DataTypes.DATE,
      origin: oneOf(cellConstantOrigins),
      reason: DataTypes.TEXT,
      recordedAt: DataTypes.DATE,
      probeId: DataTypes.INTEGER,
      userId: DataTypes.INTEGER,
    },
    tableOptions(sequelize, 'cell_constants'),
  );
}
