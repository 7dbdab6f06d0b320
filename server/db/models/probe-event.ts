import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import { probeEventKinds, type ProbeEventKind } from '../../../shared/contracts/vocabulary.ts';
import { identity, oneOf, tableOptions } from './columns.ts';
import type { Point } from './point.ts';
import type { Probe } from './probe.ts';
import type { User } from './user.ts';

/** Something that happened to a probe. History: rows are added, never changed. */
export class ProbeEvent extends Model<InferAttributes<ProbeEvent>, InferCreationAttributes<ProbeEvent>> {
  declare id: CreationOptional<number>;
  declare kind: ProbeEventKind;
  declare detail: CreationOptional<Record<string, unknown>>;
  declare at: Date;
  declare recordedAt: CreationOptional<Date>;
  declare probeId: number;
  declare pointId: number | null;
  declare userId: number | null;

  declare probe?: NonAttribute<Probe>;
  declare point?: NonAttribute<Point | null>;
  declare user?: NonAttribute<User | null>;
}

export function initProbeEvent(sequelize: Sequelize): void {
  ProbeEvent.init(
    {
      id: identity(),
      kind: oneOf(probeEventKinds),
      detail: DataTypes.JSONB,
      at: DataTypes.DATE,
      recordedAt: DataTypes.DATE,
      probeId: DataTypes.INTEGER,
      pointId: DataTypes.INTEGER,
      userId: DataTypes.INTEGER,
    },
    tableOptions(sequelize, 'probe_events'),
  );
}
