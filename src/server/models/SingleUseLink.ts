import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from 'sequelize';
import { database } from '../database/connection.ts';
import { binaryColumn, idColumn, optionalTimeColumn, referenceColumn, timeColumn } from './columns.ts';

/** A link that does one thing once, such as setting the first password. Only the hash of its token is stored. */
export class SingleUseLink extends Model<InferAttributes<SingleUseLink>, InferCreationAttributes<SingleUseLink>> {
  declare id: CreationOptional<string>;
  declare accountId: string;
  declare purpose: 'set-password';
  declare tokenHash: Buffer;
  declare expiresAt: Date;
  declare usedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
}

SingleUseLink.init(
  {
    id: idColumn(),
    accountId: referenceColumn(),
    purpose: { type: DataTypes.ENUM('set-password'), allowNull: false },
    tokenHash: binaryColumn(),
    expiresAt: { type: timeColumn(), allowNull: false },
    usedAt: optionalTimeColumn(),
    createdAt: timeColumn(),
  },
  { sequelize: database, modelName: 'singleUseLink', tableName: 'single_use_links', updatedAt: false },
);
