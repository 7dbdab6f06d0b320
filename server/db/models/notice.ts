import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import { noticeKinds, type NoticeKind } from '../../../shared/contracts/vocabulary.ts';
import { identity, oneOf, tableOptions } from './columns.ts';
import type { Device } from './device.ts';
import type { Probe } from './probe.ts';
import type { User } from './user.ts';

/** An integrity notice: something that should not happen and that a person must look at. */
export class Notice extends Model<InferAttributes<Notice>, InferCreationAttributes<Notice>> {
  declare id: CreationOptional<number>;
  declare kind: NoticeKind;
  declare detail: CreationOptional<Record<string, unknown>>;
  declare at: Date;
  declare closedAt: Date | null;
  declare deviceId: number | null;
  declare probeId: number | null;
  declare closedBy: number | null;

  declare device?: NonAttribute<Device | null>;
  declare probe?: NonAttribute<Probe | null>;
  declare closer?: NonAttribute<User | null>;
}

export function initNotice(sequelize: Sequelize): void {
  Notice.init(
    {
      id: identity(),
      kind: oneOf(noticeKinds),
      detail: DataTypes.JSONB,
      at: DataTypes.DATE,
      closedAt: DataTypes.DATE,
      deviceId: DataTypes.INTEGER,
      probeId: DataTypes.INTEGER,
      closedBy: DataTypes.INTEGER,
    },
    tableOptions(sequelize, 'notices'),
  );
}
