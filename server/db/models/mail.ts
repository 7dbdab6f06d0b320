import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize';
import { identity, tableOptions } from './columns.ts';

/** A mail to send. Written with the change that causes it; `dedupeKey` lets a repeated cause send one. */
export class Mail extends Model<InferAttributes<Mail>, InferCreationAttributes<Mail>> {
  declare id: CreationOptional<number>;
  declare kind: string;
  declare toAddress: string;
  declare subject: string;
  declare textBody: string;
  declare htmlBody: string | null;
  declare dedupeKey: string | null;
  declare attempts: CreationOptional<number>;
  declare lastError: string | null;
  declare createdAt: CreationOptional<Date>;
  declare sendAfter: CreationOptional<Date>;
  declare sentAt: Date | null;
}

export function initMail(sequelize: Sequelize): void {
  Mail.init(
    {
      id: identity(),
      kind: DataTypes.TEXT,
      toAddress: DataTypes.TEXT,
      subject: DataTypes.TEXT,
      textBody: DataTypes.TEXT,
      htmlBody: DataTypes.TEXT,
      dedupeKey: DataTypes.TEXT,
      attempts: DataTypes.INTEGER,
      lastError: DataTypes.TEXT,
      createdAt: DataTypes.DATE,
      sendAfter: DataTypes.DATE,
      sentAt: DataTypes.DATE,
    },
    tableOptions(sequelize, 'mails'),
  );
}
