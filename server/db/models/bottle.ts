import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import { identity, tableOptions, versionColumn } from './columns.ts';
import type { Standard } from './standard.ts';
import type { Site } from './site.ts';
import type { User } from './user.ts';

/** One bottle of a lot, from its label to its last aliquot. */
export class Bottle extends Model<InferAttributes<Bottle>, InferCreationAttributes<Bottle>> {
  declare id: CreationOptional<number>;
  declare code: string;
  declare volumeMl: number;
  declare remainingMl: number;
  declare openedAt: Date | null;
  declare useByOn: string | null;
  declare discardedAt: Date | null;
  declare discardedReason: string | null;
  declare createdAt: CreationOptional<Date>;
  declare version: CreationOptional<number>;
  declare standardId: number;
  declare siteId: number | null;
  declare openedBy: number | null;

  declare standard?: NonAttribute<Standard>;
  declare site?: NonAttribute<Site | null>;
  declare opener?: NonAttribute<User | null>;
}

export function initBottle(sequelize: Sequelize): void {
  Bottle.init(
    {
      id: identity(),
      code: DataTypes.TEXT,
      volumeMl: DataTypes.DOUBLE,
      remainingMl: DataTypes.DOUBLE,
      openedAt: DataTypes.DATE,
      useByOn: DataTypes.DATEONLY,
      discardedAt: DataTypes.DATE,
      discardedReason: DataTypes.TEXT,
      createdAt: DataTypes.DATE,
      version: versionColumn(),
      standardId: DataTypes.INTEGER,
      siteId: DataTypes.INTEGER,
      openedBy: DataTypes.INTEGER,
    },
    { ...tableOptions(sequelize, 'bottles'), version: true },
  );
}
