import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type ModelAttributeColumnOptions,
  type NonAttribute,
} from 'sequelize';
import { EVENTS_PER_TURN_ORIGINS, type Geometry } from '#lib/schemas/build.ts';
import { database } from '../database/connection.ts';
import { idColumn, optionalNumberColumn, optionalTextColumn, referenceColumn, timeColumn } from './columns.ts';

const partCountColumn = () =>
  ({ type: DataTypes.SMALLINT.UNSIGNED, allowNull: true, defaultValue: null }) satisfies ModelAttributeColumnOptions;

/** One motor as built. A change to its geometry raises `revision`; recordings keep the revision they were made of. */
export class Build extends Model<InferAttributes<Build>, InferCreationAttributes<Build>> {
  declare id: CreationOptional<string>;
  declare benchId: string;
  declare name: string;
  declare revision: CreationOptional<number>;
  declare poles: CreationOptional<number | null>;
  declare segments: CreationOptional<number | null>;
  declare blades: CreationOptional<number | null>;
  declare teeth: CreationOptional<number | null>;
  declare magnets: CreationOptional<number | null>;
  declare eventsPerTurn: number;
  declare eventsPerTurnOrigin: (typeof EVENTS_PER_TURN_ORIGINS)[number];
  declare orders: CreationOptional<number[]>;
  declare minimumRpm: CreationOptional<number | null>;
  declare maximumRpm: CreationOptional<number | null>;
  declare notes: CreationOptional<string | null>;
  declare createdBy: string;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;

  get geometry(): NonAttribute<Geometry> {
    const { poles, segments, blades, teeth, magnets } = this;
    return { poles, segments, blades, teeth, magnets };
  }
}

Build.init(
  {
    id: idColumn(),
    benchId: referenceColumn(),
    name: { type: DataTypes.STRING(120), allowNull: false },
    revision: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 1 },
    poles: partCountColumn(),
    segments: partCountColumn(),
    blades: partCountColumn(),
    teeth: partCountColumn(),
    magnets: partCountColumn(),
    eventsPerTurn: { type: DataTypes.DOUBLE, allowNull: false },
    eventsPerTurnOrigin: { type: DataTypes.ENUM(...EVENTS_PER_TURN_ORIGINS), allowNull: false },
    orders: { type: DataTypes.JSON, allowNull: false, defaultValue: [] },
    minimumRpm: optionalNumberColumn(),
    maximumRpm: optionalNumberColumn(),
    notes: optionalTextColumn(),
    createdBy: referenceColumn(),
    createdAt: timeColumn(),
    updatedAt: timeColumn(),
  },
  { sequelize: database, modelName: 'build', tableName: 'builds' },
);
