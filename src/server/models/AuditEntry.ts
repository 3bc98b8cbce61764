import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from 'sequelize';
import { database } from '../database/connection.ts';
import { optionalReferenceColumn, timeColumn } from './columns.ts';

/** One line of the audit log: append-only. */
export class AuditEntry extends Model<InferAttributes<AuditEntry>, InferCreationAttributes<AuditEntry>> {
  declare id: CreationOptional<number>;
  declare benchId: CreationOptional<string | null>;
  declare actorAccountId: CreationOptional<string | null>;
  /** Noun and past verb: `recording.created`, `sign-in.refused`, `reading.reviewed`, `access.denied`. */
  declare action: string;
  declare objectType: CreationOptional<string | null>;
  declare objectId: CreationOptional<string | null>;
  declare details: CreationOptional<object>;
  declare requestId: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
}

AuditEntry.init(
  {
    id: {
      type: DataTypes.BIGINT.UNSIGNED,
      primaryKey: true,
      autoIncrement: true,
      get() {
        return Number(this.getDataValue('id'));
      },
    },
    benchId: optionalReferenceColumn(),
    actorAccountId: optionalReferenceColumn(),
    action: { type: DataTypes.STRING(60), allowNull: false },
    objectType: { type: DataTypes.STRING(40), allowNull: true, defaultValue: null },
    objectId: optionalReferenceColumn(),
    details: { type: DataTypes.JSON, allowNull: false, defaultValue: {} },
    requestId: { type: DataTypes.STRING(64), allowNull: true, defaultValue: null },
    createdAt: timeColumn(),
  },
  { sequelize: database, modelName: 'auditEntry', tableName: 'audit_log', updatedAt: false },
);
