import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from 'sequelize';
import { database } from '../database/connection.ts';
import { binaryColumn, idColumn, optionalTimeColumn, referenceColumn, timeColumn } from './columns.ts';

/** A key for scripts and bench rigs, acting as its account. Only its SHA-256 is stored. */
export class ApiToken extends Model<InferAttributes<ApiToken>, InferCreationAttributes<ApiToken>> {
  declare id: CreationOptional<string>;
  declare accountId: string;
  declare name: string;
  declare tokenHash: Buffer;
  declare access: 'read' | 'write';
  declare expiresAt: CreationOptional<Date | null>;
  declare lastUsedAt: CreationOptional<Date | null>;
  declare revokedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
}

ApiToken.init(
  {
    id: idColumn(),
    accountId: referenceColumn(),
    name: { type: DataTypes.STRING(120), allowNull: false },
    tokenHash: binaryColumn(),
    access: { type: DataTypes.ENUM('read', 'write'), allowNull: false },
    expiresAt: optionalTimeColumn(),
    lastUsedAt: optionalTimeColumn(),
    revokedAt: optionalTimeColumn(),
    createdAt: timeColumn(),
  },
  { sequelize: database, modelName: 'apiToken', tableName: 'api_tokens', updatedAt: false },
);
