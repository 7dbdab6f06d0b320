import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import { identity, tableOptions } from './columns.ts';
import type { Point } from './point.ts';
import type { Probe } from './probe.ts';
import type { User } from './user.ts';

/** Probe at point, from–to (`toAt` null: still there). The database refuses overlaps for either. */
export class Assignment extends Model<InferAttributes<Assignment>, InferCreationAttributes<Assignment>> {
  declare id: CreationOptional<number>;
  declare fromAt: Date;
  declare toAt: Date | null;
  declare note: CreationOptional<string>;
  declare probeId: number;
  declare pointId: number;
  declare installedBy: number;
  declare removedBy: number | null;

  declare probe?: NonAttribute<Probe>;
  declare point?: NonAttribute<Point>;
  declare installer?: NonAttribute<User>;
  declare remover?: NonAttribute<User | null>;
}

export function initAssignment(sequelize: Sequelize): void {
  Assignment.init(
    {
      id: identity(),
      fromAt: DataTypes.DATE,
      toAt: DataTypes.DATE,
      note: DataTypes.TEXT,
      probeId: DataTypes.INTEGER,
      pointId: DataTypes.INTEGER,
      installedBy: DataTypes.INTEGER,
      removedBy: DataTypes.INTEGER,
    },
    tableOptions(sequelize, 'assignments'),
  );
}
