import {
  DataTypes,
  Model,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize';
import { tableOptions } from './columns.ts';

/** A bucket that late readings made stale; a job computes it again. */
export class RollupDue extends Model<InferAttributes<RollupDue>, InferCreationAttributes<RollupDue>> {
  declare probeId: number;
  declare bucketAt: Date;
}

export function initRollupDue(sequelize: Sequelize): void {
  RollupDue.init(
    {
      probeId: { type: DataTypes.INTEGER, primaryKey: true },
      bucketAt: { type: DataTypes.DATE, primaryKey: true },
    },
    tableOptions(sequelize, 'rollups_due'),
  );
}
