import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import { roles, type Role } from '../../../shared/contracts/vocabulary.ts';
import { identity, oneOf, tableOptions } from './columns.ts';
import type { Site } from './site.ts';
import type { User } from './user.ts';

/**
 * A person's role at one site (`siteId` null: at all sites). One open role per person and site; an
 * auditor's always has a last day.
 */
export class Membership extends Model<InferAttributes<Membership>, InferCreationAttributes<Membership>> {
  declare id: CreationOptional<number>;
  declare role: Role;
  declare createdAt: CreationOptional<Date>;
  declare endsOn: string | null;
  declare endedAt: Date | null;
  declare userId: number;
  declare siteId: number | null;

  declare user?: NonAttribute<User>;
  declare site?: NonAttribute<Site>;
}

export function initMembership(sequelize: Sequelize): void {
  Membership.init(
    {
      id: identity(),
      role: oneOf(roles),
      createdAt: DataTypes.DATE,
      endsOn: DataTypes.DATEONLY,
      endedAt: DataTypes.DATE,
      userId: DataTypes.INTEGER,
      siteId: DataTypes.INTEGER,
    },
    tableOptions(sequelize, 'memberships'),
  );
}
