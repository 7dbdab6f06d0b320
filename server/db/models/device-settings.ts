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

/** One set of settings a device has announced, by its hash; `birth` is the message that announced it. */
export class DeviceSettings extends Model<
  InferAttributes<DeviceSettings>,
  InferCreationAttributes<DeviceSettings>
> {
  declare id: CreationOptional<number>;
  declare settingsHash: string;
  declare cellConstantPerCm: number | null;
  declare birth: Record<string, unknown> | null;
  declare firstSeenAt: CreationOptional<Date>;
  declare deviceId: number;

  declare device?: NonAttribute<Device>;
}

export function initDeviceSettings(sequelize: Sequelize): void {
  DeviceSettings.init(
    {
      id: identity(),
      settingsHash: DataTypes.TEXT,
      cellConstantPerCm: DataTypes.DOUBLE,
      birth: DataTypes.JSONB,
      firstSeenAt: DataTypes.DATE,
      deviceId: DataTypes.INTEGER,
    },
    tableOptions(sequelize, 'device_settings'),
  );
}
