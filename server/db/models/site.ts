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
import type { Area } from './area.ts';

/** A works with its own time zone and policy. The code never changes once records name it. */
export class Site extends Model<InferAttributes<Site>, InferCreationAttributes<Site>> {
  declare id: CreationOptional<number>;
  declare code: string;
  declare name: string;
  declare timeZone: string;
  declare policy: CreationOptional<Record<string, unknown>>;
  declare createdAt: CreationOptional<Date>;
  declare retiredAt: Date | null;
  declare version: CreationOptional<number>;

  declare areas?: NonAttribute<Area[]>;
}

export function initSite(sequelize: Sequelize): void {
  Site.init(
    {
      id: identity(),
      code: DataTypes.TEXT,
      name: DataTypes.TEXT,
      timeZone: DataTypes.TEXT,
      policy: DataTypes.JSONB,
      createdAt: DataTypes.DATE,
      retiredAt: DataTypes.DATE,
      version: versionColumn(),
    },
    { ...tableOptions(sequelize, 'sites'), version: true },
  );
}
