import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import {
  deviceCompensations,
  probeKinds,
  probeStatuses,
  temperatureSensors,
  type DeviceCompensation,
  type ProbeKind,
  type ProbeStatus,
  type TemperatureSensor,
} from '../../../shared/contracts/vocabulary.ts';
import { identity, oneOf, tableOptions, versionColumn } from './columns.ts';
import type { Assignment } from './assignment.ts';
import type { CellConstant } from './cell-constant.ts';
import type { Check } from './check.ts';
import type { Device } from './device.ts';
import type { LiveReading } from './live-reading.ts';
import type { ProbeEvent } from './probe-event.ts';
import type { Site } from './site.ts';

/**
 * A conductivity probe. Serial, kind and nominal cell constant never change; `cellConstantPerCm` is the
 * one in use per the newest approved record; `siteId` is where it is kept and follows the assignment.
 */
export class Probe extends Model<InferAttributes<Probe>, InferCreationAttributes<Probe>> {
  declare id: CreationOptional<number>;
  declare serial: string;
  declare tag: string;
  declare kind: ProbeKind;
  declare nominalCellConstantPerCm: number;
  declare cellConstantPerCm: number;
  declare rangeLowUsCm: number;
  declare rangeHighUsCm: number;
  declare resolutionUsCm: number | null;
  declare temperatureSensor: TemperatureSensor;
  declare deviceCompensation: DeviceCompensation;
  declare notes: CreationOptional<string>;
  declare status: ProbeStatus;
  declare createdAt: CreationOptional<Date>;
  declare retiredAt: Date | null;
  declare retiredReason: string | null;
  declare version: CreationOptional<number>;
  declare siteId: number;

  declare site?: NonAttribute<Site>;
  declare assignments?: NonAttribute<Assignment[]>;
  declare cellConstants?: NonAttribute<CellConstant[]>;
  declare events?: NonAttribute<ProbeEvent[]>;
  declare devices?: NonAttribute<Device[]>;
  declare checks?: NonAttribute<Check[]>;
  declare liveReading?: NonAttribute<LiveReading | null>;
}

export function initProbe(sequelize: Sequelize): void {
  Probe.init(
    {
      id: identity(),
      serial: DataTypes.TEXT,
      tag: DataTypes.TEXT,
      kind: oneOf(probeKinds),
      nominalCellConstantPerCm: DataTypes.DOUBLE,
      cellConstantPerCm: DataTypes.DOUBLE,
      rangeLowUsCm: DataTypes.DOUBLE,
      rangeHighUsCm: DataTypes.DOUBLE,
      resolutionUsCm: DataTypes.DOUBLE,
      temperatureSensor: oneOf(temperatureSensors),
      deviceCompensation: oneOf(deviceCompensations),
      notes: DataTypes.TEXT,
      status: oneOf(probeStatuses),
      createdAt: DataTypes.DATE,
      retiredAt: DataTypes.DATE,
      retiredReason: DataTypes.TEXT,
      version: versionColumn(),
      siteId: DataTypes.INTEGER,
    },
    { ...tableOptions(sequelize, 'probes'), version: true },
  );
}
