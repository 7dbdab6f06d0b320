import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import { identity, tableOptions } from './columns.ts';
import type { User } from './user.ts';

/** A certificate file exactly as received. Never changed. */
export class Certificate extends Model<InferAttributes<Certificate>, InferCreationAttributes<Certificate>> {
  declare id: CreationOptional<number>;
  declare sha256: string;
  declare mediaType: string;
  declare byteCount: number;
  declare fileName: string;
  declare content: Buffer;
  declare uploadedAt: Date;
  declare uploadedBy: number;

  declare uploader?: NonAttribute<User>;
}

export function initCertificate(sequelize: Sequelize): void {
  Certificate.init(
    {
      id: identity(),
      sha256: DataTypes.CHAR(64),
      mediaType: DataTypes.TEXT,
      byteCount: DataTypes.INTEGER,
      fileName: DataTypes.TEXT,
      content: DataTypes.BLOB,
      uploadedAt: DataTypes.DATE,
      uploadedBy: DataTypes.INTEGER,
    },
    tableOptions(sequelize, 'certificates'),
  );
}
