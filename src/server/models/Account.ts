import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from 'sequelize';
import { database } from '../database/connection.ts';
import { idColumn, optionalTimeColumn, timeColumn } from './columns.ts';

/** A person who can sign in. `email` is stored in lower case; `passwordHash` is null until the person sets one. */
export class Account extends Model<InferAttributes<Account>, InferCreationAttributes<Account>> {
  declare id: CreationOptional<string>;
  declare email: string;
  declare name: string;
  declare passwordHash: CreationOptional<string | null>;
  declare disabledAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;

  static loadByEmail(email: string): Promise<Account | null> {
    return Account.findOne({ where: { email: email.toLowerCase() } });
  }
}

Account.init(
  {
    id: idColumn(),
    email: { type: DataTypes.STRING(254), allowNull: false },
    name: { type: DataTypes.STRING(120), allowNull: false },
    passwordHash: { type: DataTypes.STRING(255), allowNull: true, defaultValue: null },
    disabledAt: optionalTimeColumn(),
    createdAt: timeColumn(),
    updatedAt: timeColumn(),
  },
  { sequelize: database, modelName: 'account', tableName: 'accounts' },
);
