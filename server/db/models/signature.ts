import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize';
import { signatureMeanings, type SignatureMeaning } from '../../../shared/contracts/vocabulary.ts';
import { identity, oneOf, tableOptions } from './columns.ts';

/** Who signed a record, when, meaning what, of which content. Name and role are those of that moment. Never changed. */
export class Signature extends Model<InferAttributes<Signature>, InferCreationAttributes<Signature>> {
  declare id: CreationOptional<number>;
  declare name: string;
  declare role: string;
  declare meaning: SignatureMeaning;
  declare statement: string;
  declare method: string;
  declare recordHash: string;
  declare note: string | null;
  declare signedAt: Date;
  declare capturedAt: Date;
  declare calibrationId: number;
  declare userId: number;
}

export function initSignature(sequelize: Sequelize): void {
  Signature.init(
    {
      id: identity(),
      name: DataTypes.TEXT,
      role: DataTypes.TEXT,
      meaning: oneOf(signatureMeanings),
      statement: DataTypes.TEXT,
      method: DataTypes.TEXT,
      recordHash: DataTypes.CHAR(64),
      note: DataTypes.TEXT,
      signedAt: DataTypes.DATE,
      capturedAt: DataTypes.DATE,
      calibrationId: DataTypes.INTEGER,
      userId: DataTypes.INTEGER,
    },
    tableOptions(sequelize, 'signatures'),
  );
}
