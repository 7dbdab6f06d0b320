/** The few kinds of column the models are made of. What a column may hold is enforced by the database. */
import { DataTypes, type ModelAttributeColumnOptions, type ModelOptions, type Sequelize } from 'sequelize';

export const identity = (): ModelAttributeColumnOptions => ({
  type: DataTypes.INTEGER,
  primaryKey: true,
  autoIncrement: true,
});

/** A word of a closed list in shared/contracts/vocabulary.ts; null passes, the database decides about null. */
export const oneOf = (words: readonly string[]): ModelAttributeColumnOptions => ({
  type: DataTypes.TEXT,
  validate: { isIn: [[...words]] },
});

/** Optimistic lock: `save()` throws OptimisticLockError when somebody else saved first. */
export const versionColumn = (): ModelAttributeColumnOptions => ({
  type: DataTypes.INTEGER,
  allowNull: false,
  defaultValue: 0,
});

/**
 * Columns are the attributes in snake_case. Sequelize keeps no timestamps: `created_at` and the like are set by
 * the database, the others by services with the time they were given.
 */
export const tableOptions = (sequelize: Sequelize, tableName: string) =>
  ({ sequelize, tableName, underscored: true, timestamps: false }) satisfies ModelOptions & {
    sequelize: Sequelize;
  };
