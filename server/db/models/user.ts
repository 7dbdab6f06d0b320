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
import type { Membership } from './membership.ts';

/**
 * A person who signs in. The e-mail is unique without regard to case. A person is deactivated, never
 * deleted.
 */
export class User extends Model<InferAttributes<User>, InferCreationAttributes<User>> {
  declare id: CreationOptional<number>;
  declare email: string;
  declare name: string;
  declare passwordHash: string | null;
  declare failedSignIns: CreationOptional<number>;
  declare lockedUntil: Date | null;
  declare passwordChangedAt: Date | null;
  declare lastSignInAt: Date | null;
  declare createdAt: CreationOptional<Date>;
  declare deactivatedAt: Date | null;
  declare version: CreationOptional<number>;

  declare memberships?: NonAttribute<Membership[]>;
}

export function initUser(sequelize: Sequelize): void {
  User.init(
    {
      id: identity(),
      email: DataTypes.TEXT,
      name: DataTypes.TEXT,
      passwordHash: DataTypes.TEXT,
      failedSignIns: DataTypes.INTEGER,
      lockedUntil: DataTypes.DATE,
      passwordChangedAt: DataTypes.DATE,
      lastSignInAt: DataTypes.DATE,
      createdAt: DataTypes.DATE,
      deactivatedAt: DataTypes.DATE,
      version: versionColumn(),
    },
    { ...tableOptions(sequelize, 'users'), version: true },
  );
}
