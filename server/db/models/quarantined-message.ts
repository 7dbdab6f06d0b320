import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import { quarantineCodes, type QuarantineCode } from '../../../shared/contracts/vocabulary.ts';
import { identity, oneOf, tableOptions } from './columns.ts';
import type { User } from './user.ts';

/** A message ingest could not use, with the code why. `payload` keeps at most 64 KiB of its `payloadBytes`. */
export class QuarantinedMessage extends Model<
  InferAttributes<QuarantinedMessage>,
  InferCreationAttributes<QuarantinedMessage>
> {
  declare id: CreationOptional<number>;
  declare deviceName: string | null;
  declare clientId: string | null;
  declare topic: string;
  declare code: QuarantineCode;
  declare reason: string;
  declare payload: Buffer;
  declare payloadBytes: number;
  declare receivedAt: CreationOptional<Date>;
  declare resolvedAt: Date | null;
  declare resolution: string | null;
  declare resolvedBy: number | null;

  declare resolver?: NonAttribute<User | null>;
}

export function initQuarantinedMessage(sequelize: Sequelize): void {
  QuarantinedMessage.init(
    {
      id: identity(),
      deviceName: DataTypes.TEXT,
      clientId: DataTypes.TEXT,
      topic: DataTypes.TEXT,
      code: oneOf(quarantineCodes),
      reason: DataTypes.TEXT,
      payload: DataTypes.BLOB,
      payloadBytes: DataTypes.INTEGER,
      receivedAt: DataTypes.DATE,
      resolvedAt: DataTypes.DATE,
      resolution: DataTypes.TEXT,
      resolvedBy: DataTypes.INTEGER,
    },
    tableOptions(sequelize, 'quarantined_messages'),
  );
}
