import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize';
import { tableOptions, versionColumn } from './columns.ts';

/** One setting of the installation. */
export class Setting extends Model<InferAttributes<Setting>, InferCreationAttributes<Setting>> {
  declare key: string;
  declare value: unknown;
  declare updatedAt: CreationOptional<Date>;
  declare version: CreationOptional<number>;
}

export function initSetting(sequelize: Sequelize): void {
  Setting.init(
    {
      key: { type: DataTypes.TEXT, primaryKey: true },
      value: DataTypes.JSONB,
      updatedAt: DataTypes.DATE,
      version: versionColumn(),
    },
    { ...tableOptions(sequelize, 'settings'), version: true },
  );
}
