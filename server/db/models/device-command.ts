import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import { commandStates, type CommandState } from '../../../shared/contracts/vocabulary.ts';
import { identity, oneOf, tableOptions } from './columns.ts';
import type { Device } from './device.ts';

/** An order to a device that a person has to see confirmed. */
export class DeviceCommand extends Model<
  InferAttributes<DeviceCommand>,
  InferCreationAttributes<DeviceCommand>
> {
  declare id: CreationOptional<number>;
  declare what: 'apply-cell-constant';
  declare cellConstantPerCm: number;
  declare state: CommandState;
  declare requestedAt: Date;
  declare sentAt: Date | null;
  declare answeredAt: Date | null;
  declare detail: string | null;
  declare deviceId: number;
  declare calibrationId: number;
  declare requestedBy: number;

  declare device?: NonAttribute<Device>;
}

export function initDeviceCommand(sequelize: Sequelize): void {
  DeviceCommand.init(
    {
      id: identity(),
      what: oneOf(['apply-cell-constant']),
      cellConstantPerCm: DataTypes.DOUBLE,
      state: oneOf(commandStates),
      requestedAt: DataTypes.DATE,
      sentAt: DataTypes.DATE,
      answeredAt: DataTypes.DATE,
      detail: DataTypes.TEXT,
      deviceId: DataTypes.INTEGER,
      calibrationId: DataTypes.INTEGER,
      requestedBy: DataTypes.INTEGER,
    },
    tableOptions(sequelize, 'device_commands'),
  );
}
