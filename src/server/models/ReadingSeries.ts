import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from 'sequelize';
import { SERIES_NAMES, type SeriesName } from '#lib/analysis/series.ts';
import { database } from '../database/connection.ts';
import { idColumn, referenceColumn } from './columns.ts';

/** Name, unit and number of values of one column of a stored series. */
export interface StoredColumn {
  readonly name: string;
  readonly unit: string;
  readonly length: number;
}

/** One series of a reading: 32-bit floats, little-endian, one column after the other. */
export class ReadingSeries extends Model<InferAttributes<ReadingSeries>, InferCreationAttributes<ReadingSeries>> {
  declare id: CreationOptional<string>;
  declare benchId: string;
  declare readingId: string;
  declare name: SeriesName;
  declare columnsLayout: StoredColumn[];
  declare payload: Buffer;

  /** Which series each of these readings has, in the order of SERIES_NAMES; a reading without any is absent. */
  static async listNamesByReadings(
    benchIds: readonly string[],
    readingIds: readonly string[],
  ): Promise<Map<string, SeriesName[]>> {
    if (readingIds.length === 0) return new Map();
    const rows = await ReadingSeries.findAll({
      attributes: ['readingId', 'name'],
      where: { benchId: [...benchIds], readingId: [...readingIds] },
    });
    const isOf = new Set(rows.map(({ readingId, name }) => `${readingId} ${name}`));
    return new Map(
      rows.map(({ readingId }) => [readingId, SERIES_NAMES.filter((name) => isOf.has(`${readingId} ${name}`))]),
    );
  }
}

ReadingSeries.init(
  {
    id: idColumn(),
    benchId: referenceColumn(),
    readingId: referenceColumn(),
    name: { type: DataTypes.ENUM(...SERIES_NAMES), allowNull: false },
    columnsLayout: { type: DataTypes.JSON, allowNull: false },
    payload: { type: DataTypes.BLOB('medium'), allowNull: false },
  },
  { sequelize: database, modelName: 'readingSeries', tableName: 'reading_series', timestamps: false },
);
