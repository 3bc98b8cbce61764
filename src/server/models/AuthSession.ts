import type { CreationOptional, InferAttributes, InferCreationAttributes } from 'sequelize';
import { Model } from 'sequelize';
import { database } from '../database/connection.ts';
import { binaryColumn, referenceColumn, timeColumn } from './columns.ts';

/** One sign-in. The identifier in the cookie is stored only as its SHA-256. */
export class AuthSession extends Model<InferAttributes<AuthSession>, InferCreationAttributes<AuthSession>> {
  declare idHash: Buffer;
  declare accountId: string;
  declare expiresAt: Date;
  declare createdAt: CreationOptional<Date>;
}

AuthSession.init(
  {
    idHash: { ...binaryColumn(), primaryKey: true },
    accountId: referenceColumn(),
    expiresAt: { type: timeColumn(), allowNull: false },
    createdAt: timeColumn(),
  },
  { sequelize: database, modelName: 'authSession', tableName: 'auth_sessions', updatedAt: false },
);
