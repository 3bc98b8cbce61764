import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from 'sequelize';
import { database } from '../database/connection.ts';
import { idColumn, optionalTimeColumn, referenceColumn, timeColumn } from './columns.ts';

/** A phone or recorder with the known error of its sample clock; positive = the clock runs fast. */
export class Device extends Model<InferAttributes<Device>, InferCreationAttributes<Device>> {
  declare id: CreationOptional<string>;
  declare benchId: string;
  declare name: string;
  declare clockCorrectionPpm: CreationOptional<number>;
  declare clockCorrectedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

Device.init(
  {
    id: idColumn(),
    benchId: referenceColumn(),
    name: { type: DataTypes.STRING(120), allowNull: false },
    clockCorrectionPpm: { type: DataTypes.DOUBLE, allowNull: false, defaultValue: 0 },
    clockCorrectedAt: optionalTimeColumn(),
    createdAt: timeColumn(),
    updatedAt: timeColumn(),
  },
  { sequelize: database, modelName: 'device', tableName: 'devices' },
);
