import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import { exclusionCodes, type ExclusionCode } from '../../../shared/contracts/vocabulary.ts';
import { identity, oneOf, tableOptions } from './columns.ts';
import type { User } from './user.ts';

/** Why a captured reading does not count. Never changed. */
export class CaptureExclusion extends Model<
  InferAttributes<CaptureExclusion>,
  InferCreationAttributes<CaptureExclusion>
> {
  declare id: CreationOptional<number>;
  declare key: string;
  declare code: ExclusionCode;
  declare note: string | null;
  declare at: Date;
  declare receivedAt: Date;
  declare captureId: number;
  declare userId: number;

  declare user?: NonAttribute<User>;
}

export function initCaptureExclusion(sequelize: Sequelize): void {
  CaptureExclusion.init(
    {
      id: identity(),
      key: DataTypes.UUID,
      code: oneOf(exclusionCodes),
      note: DataTypes.TEXT,
      at: DataTypes.DATE,
      receivedAt: DataTypes.DATE,
      captureId: DataTypes.INTEGER,
      userId: DataTypes.INTEGER,
    },
    tableOptions(sequelize, 'capture_exclusions'),
  );
}
