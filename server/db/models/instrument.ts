import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize';
import {
  instrumentKinds,
  instrumentStates,
  type InstrumentKind,
  type InstrumentState,
} from '../../../shared/contracts/vocabulary.ts';
import { identity, oneOf, tableOptions, versionColumn } from './columns.ts';

/** A reference instrument and what its certificate says of it. */
export class Instrument extends Model<InferAttributes<Instrument>, InferCreationAttributes<Instrument>> {
  declare id: CreationOptional<number>;
  declare code: string;
  declare kind: InstrumentKind;
  declare name: string;
  declare serial: string;
  declare certificateNumber: string;
  declare issuedOn: string;
  declare dueOn: string;
  declare expandedUncertainty: number;
  declare uncertaintyUnit: 'C' | 'percent' | 'uS/cm' | 'ohm' | 'g';
  declare coverageFactor: number;
  declare correction: CreationOptional<number>;
  declare traceability: CreationOptional<string>;
  declare state: CreationOptional<InstrumentState>;
  declare createdAt: CreationOptional<Date>;
  declare version: CreationOptional<number>;
  declare certificateId: number | null;
}

export function initInstrument(sequelize: Sequelize): void {
  Instrument.init(
    {
      id: identity(),
      code: DataTypes.TEXT,
      kind: oneOf(instrumentKinds),
      name: DataTypes.TEXT,
      serial: DataTypes.TEXT,
      certificateNumber: DataTypes.TEXT,
      issuedOn: DataTypes.DATEONLY,
      dueOn: DataTypes.DATEONLY,
      expandedUncertainty: DataTypes.DOUBLE,
      uncertaintyUnit: oneOf(['C', 'percent', 'uS/cm', 'ohm', 'g']),
      coverageFactor: DataTypes.DOUBLE,
      correction: DataTypes.DOUBLE,
      traceability: DataTypes.TEXT,
      state: oneOf(instrumentStates),
      createdAt: DataTypes.DATE,
      version: versionColumn(),
      certificateId: DataTypes.INTEGER,
    },
    { ...tableOptions(sequelize, 'instruments'), version: true },
  );
}
