import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type NonAttribute,
  Op,
} from 'sequelize';
import { SESSION_PURPOSES, type SessionPurpose } from '#lib/schemas/session.ts';
import { database } from '../database/connection.ts';
import { afterCursor, NEWEST_FIRST } from '../database/pageCursor.ts';
import { Account } from './Account.ts';
import { Build } from './Build.ts';
import {
  idColumn,
  optionalNumberColumn,
  optionalReferenceColumn,
  optionalTextColumn,
  referenceColumn,
  timeColumn,
} from './columns.ts';

/** One occasion of measuring: a purpose, the conditions that hold for all of it, a set of recordings. */
export class Session extends Model<InferAttributes<Session>, InferCreationAttributes<Session>> {
  declare id: CreationOptional<string>;
  declare benchId: string;
  declare buildId: CreationOptional<string | null>;
  declare title: string;
  declare purpose: SessionPurpose;
  declare supplyVolts: CreationOptional<number | null>;
  declare loadDescription: CreationOptional<string | null>;
  declare ambientCelsius: CreationOptional<number | null>;
  declare note: CreationOptional<string | null>;
  declare createdBy: string;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
  declare build?: NonAttribute<Build | null>;
  declare creator?: NonAttribute<Account>;

  static async loadByIdInBenches(id: string, benchIds: readonly string[]): Promise<SessionWithBuildAndCreator | null> {
    const session = await Session.findOne({ where: { id, benchId: [...benchIds] }, include: BUILD_AND_CREATOR });
    return session as SessionWithBuildAndCreator | null;
  }

  /** Newest first, after the cursor of an earlier page. */
  static async listByBenches(
    benchIds: readonly string[],
    { limit, cursor, purpose }: { limit: number; cursor: string | undefined; purpose?: SessionPurpose | undefined },
  ): Promise<SessionWithBuildAndCreator[]> {
    const sessions = await Session.findAll({
      where: {
        [Op.and]: [{ benchId: [...benchIds] }, ...(purpose === undefined ? [] : [{ purpose }]), afterCursor(cursor)],
      },
      include: BUILD_AND_CREATOR,
      order: NEWEST_FIRST,
      limit,
    });
    return sessions as SessionWithBuildAndCreator[];
  }
}

export type SessionWithBuildAndCreator = Session & { build: Build | null; creator: Account };

const BUILD_AND_CREATOR = [
  { association: 'build', attributes: ['id', 'name', 'revision'] },
  { association: 'creator', attributes: ['id', 'name'], required: true },
];

Session.init(
  {
    id: idColumn(),
    benchId: referenceColumn(),
    buildId: optionalReferenceColumn(),
    title: { type: DataTypes.STRING(120), allowNull: false },
    purpose: { type: DataTypes.ENUM(...SESSION_PURPOSES), allowNull: false },
    supplyVolts: optionalNumberColumn(),
    loadDescription: { type: DataTypes.STRING(120), allowNull: true, defaultValue: null },
    ambientCelsius: optionalNumberColumn(),
    note: optionalTextColumn(),
    createdBy: referenceColumn(),
    createdAt: timeColumn(),
    updatedAt: timeColumn(),
  },
  { sequelize: database, modelName: 'session', tableName: 'sessions' },
);

Session.belongsTo(Build, { as: 'build', foreignKey: 'buildId' });
Session.belongsTo(Account, { as: 'creator', foreignKey: 'createdBy' });
