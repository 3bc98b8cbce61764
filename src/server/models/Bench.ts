import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from 'sequelize';
import { database } from '../database/connection.ts';
import { idColumn, timeColumn } from './columns.ts';

/** A team's own space, and the tenant boundary. */
export class Bench extends Model<InferAttributes<Bench>, InferCreationAttributes<Bench>> {
  declare id: CreationOptional<string>;
  declare name: string;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

Bench.init(
  {
    id: idColumn(),
    name: { type: DataTypes.STRING(120), allowNull: false },
    createdAt: timeColumn(),
    updatedAt: timeColumn(),
  },
  { sequelize: database, modelName: 'bench', tableName: 'benches' },
);
