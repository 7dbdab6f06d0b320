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
import type { Site } from './site.ts';

/** A part of a site; groups points on screens. */
export class Area extends Model<InferAttributes<Area>, InferCreationAttributes<Area>> {
  declare id: CreationOptional<number>;
  declare name: string;
  declare position: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;
  declare siteId: number;

  declare site?: NonAttribute<Site>;
  declare points?: NonAttribute<Point[]>;
}

export function initArea(sequelize: Sequelize): void {
  Area.init(
    {
      id: identity(),
      name: DataTypes.TEXT,
      position: DataTypes.INTEGER,
      createdAt: DataTypes.DATE,
      siteId: DataTypes.INTEGER,
    },
    tableOptions(sequelize, 'areas'),
  );
}
