import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import { promptKinds, type PromptKind } from '../../../shared/contracts/vocabulary.ts';
import { identity, oneOf, tableOptions } from './columns.ts';
import type { Probe } from './probe.ts';
import type { Point } from './point.ts';
import type { Site } from './site.ts';

/** Work that waits for somebody. One of a kind is open (`closedAt` null) per probe. */
export class Prompt extends Model<InferAttributes<Prompt>, InferCreationAttributes<Prompt>> {
  declare id: CreationOptional<number>;
  declare kind: PromptKind;
  declare dueOn: string;
  declare raisedAt: Date;
  declare closedAt: Date | null;
  declare probeId: number;
  declare pointId: number;
  declare siteId: number;

  declare probe?: NonAttribute<Probe>;
  declare point?: NonAttribute<Point>;
  declare site?: NonAttribute<Site>;
}

export function initPrompt(sequelize: Sequelize): void {
  Prompt.init(
    {
      id: identity(),
      kind: oneOf(promptKinds),
      dueOn: DataTypes.DATEONLY,
      raisedAt: DataTypes.DATE,
      closedAt: DataTypes.DATE,
      probeId: DataTypes.INTEGER,
      pointId: DataTypes.INTEGER,
      siteId: DataTypes.INTEGER,
    },
    tableOptions(sequelize, 'prompts'),
  );
}
