import {
  DataTypes,
  Model,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize';
import { tableOptions } from './columns.ts';

/** A signed-in browser. Written by connect-pg-simple; services only list and delete. */
export class Session extends Model<InferAttributes<Session>, InferCreationAttributes<Session>> {
  declare sid: string;
  declare sess: Record<string, unknown>;
  declare expire: Date;
}

export function initSession(sequelize: Sequelize): void {
  Session.init(
    {
      sid: { type: DataTypes.TEXT, primaryKey: true },
      sess: DataTypes.JSON,
      expire: DataTypes.DATE,
    },
    tableOptions(sequelize, 'sessions'),
  );
}
