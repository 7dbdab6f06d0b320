import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import { identity, oneOf, tableOptions } from './columns.ts';
import type { User } from './user.ts';

/** A one-time link to set a password; only its hash is kept. */
export class PasswordToken extends Model<
  InferAttributes<PasswordToken>,
  InferCreationAttributes<PasswordToken>
> {
  declare id: CreationOptional<number>;
  declare tokenHash: string;
  declare purpose: 'set-password';
  declare createdAt: CreationOptional<Date>;
  declare expiresAt: Date;
  declare usedAt: Date | null;
  declare userId: number;

  declare user?: NonAttribute<User>;
}

export function initPasswordToken(sequelize: Sequelize): void {
  PasswordToken.init(
    {
      id: identity(),
      tokenHash: DataTypes.TEXT,
      purpose: oneOf(['set-password']),
      createdAt: DataTypes.DATE,
      expiresAt: DataTypes.DATE,
      usedAt: DataTypes.DATE,
      userId: DataTypes.INTEGER,
    },
    tableOptions(sequelize, 'password_tokens'),
  );
}
