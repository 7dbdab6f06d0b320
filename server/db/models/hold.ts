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
import type { User } from './user.ts';

/** A point out of service while somebody works there. At most one is open (`endedAt` null) per point. */
export class Hold extends Model<InferAttributes<Hold>, InferCreationAttributes<Hold>> {
  declare id: CreationOptional<number>;
  declare reason: string;
  declare fromAt: Date;
  declare untilAt: Date;
  declare endedAt: Date | null;
  declare pointId: number;
  declare userId: number;

  declare point?: NonAttribute<Point>;
  declare user?: NonAttribute<User>;
}

export function initHold(sequelize: Sequelize): void {
  Hold.init(
    {
      id: identity(),
      reason: DataTypes.TEXT,
      fromAt: DataTypes.DATE,
      untilAt: DataTypes.DATE,
      endedAt: DataTypes.DATE,
      pointId: DataTypes.INTEGER,
      userId: DataTypes.INTEGER,
    },
    tableOptions(sequelize, 'holds'),
  );
}
