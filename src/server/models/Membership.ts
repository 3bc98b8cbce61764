import { ROLES, type Role } from '#lib/schemas/account.ts';
import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type NonAttribute,
} from 'sequelize';
import { database } from '../database/connection.ts';
import { Account } from './Account.ts';
import { Bench } from './Bench.ts';
import { idColumn, referenceColumn, timeColumn } from './columns.ts';

/** What an account may do in a bench. */
export class Membership extends Model<InferAttributes<Membership>, InferCreationAttributes<Membership>> {
  declare id: CreationOptional<string>;
  declare benchId: string;
  declare accountId: string;
  declare role: Role;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
  declare bench?: NonAttribute<Bench>;
  declare account?: NonAttribute<Account>;

  /** Oldest first: the first bench is the one a page opens with. */
  static async listByAccount(accountId: string): Promise<MembershipWithBench[]> {
    const memberships = await Membership.findAll({
      where: { accountId },
      include: [{ association: 'bench', required: true }],
      order: [
        ['createdAt', 'ASC'],
        ['id', 'ASC'],
      ],
    });
    return memberships as MembershipWithBench[];
  }
}

export type MembershipWithBench = Membership & { bench: Bench };

Membership.init(
  {
    id: idColumn(),
    benchId: referenceColumn(),
    accountId: referenceColumn(),
    role: { type: DataTypes.ENUM(...ROLES), allowNull: false },
    createdAt: timeColumn(),
    updatedAt: timeColumn(),
  },
  { sequelize: database, modelName: 'membership', tableName: 'memberships' },
);

Membership.belongsTo(Bench, { as: 'bench', foreignKey: 'benchId' });
Membership.belongsTo(Account, { as: 'account', foreignKey: 'accountId' });
