import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from 'sequelize';
import { database } from '../database/connection.ts';
import { binaryColumn, referenceColumn, timeColumn } from './columns.ts';

/** Something that others must hear of, written in the transaction that made it true. */
export class OutboxEvent extends Model<InferAttributes<OutboxEvent>, InferCreationAttributes<OutboxEvent>> {
  /** Grows with time, but not strictly with commits: a reader must look back a little. */
  declare id: CreationOptional<number>;
  declare benchId: string;
  declare topic: string;
  declare payload: object;
  declare dedupeKey: Buffer;
  declare createdAt: CreationOptional<Date>;
}

OutboxEvent.init(
  {
    id: {
      type: DataTypes.BIGINT.UNSIGNED,
      primaryKey: true,
      autoIncrement: true,
      get() {
        return Number(this.getDataValue('id'));
      },
    },
    benchId: referenceColumn(),
    topic: { type: DataTypes.STRING(40), allowNull: false },
    payload: { type: DataTypes.JSON, allowNull: false },
    dedupeKey: binaryColumn(),
    createdAt: timeColumn(),
  },
  { sequelize: database, modelName: 'outboxEvent', tableName: 'outbox', updatedAt: false },
);
