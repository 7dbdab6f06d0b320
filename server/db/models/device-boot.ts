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
import type { Device } from './device.ts';

/** One start of a device; readings refer to it by id. Later boots sort later as text. */
export class DeviceBoot extends Model<InferAttributes<DeviceBoot>, InferCreationAttributes<DeviceBoot>> {
  declare id: CreationOptional<number>;
  declare boot: string;
  declare firstSeenAt: CreationOptional<Date>;
  declare deviceId: number;

  declare device?: NonAttribute<Device>;
}

export function initDeviceBoot(sequelize: Sequelize): void {
  DeviceBoot.init(
    {
      id: identity(),
      boot: DataTypes.TEXT,
      firstSeenAt: DataTypes.DATE,
      deviceId: DataTypes.INTEGER,
    },
    tableOptions(sequelize, 'device_boots'),
  );
}
