import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from 'sequelize';
import {
  type Candidate,
  MOTIONS,
  type Motion,
  type NoRotationReason,
  type ReadingWarning,
} from '#lib/analysis/reading.ts';
import type { AnalysisSettings } from '#lib/analysis/settings.ts';
import { database } from '../database/connection.ts';
import { binaryColumn, idColumn, optionalNumberColumn, referenceColumn, timeColumn } from './columns.ts';

/** The result of one analysis of one recording. Immutable: the database refuses an UPDATE as well. */
export class Reading extends Model<InferAttributes<Reading>, InferCreationAttributes<Reading>> {
  declare id: CreationOptional<string>;
  declare benchId: string;
  declare recordingId: string;
  declare engineVersion: string;
  declare settingsHash: Buffer;
  declare settings: AnalysisSettings;
  declare status: 'measured' | 'no-rotation';
  declare motion: Motion;
  declare shaftSpeedRpm: CreationOptional<number | null>;
  declare lowRpm: CreationOptional<number | null>;
  declare highRpm: CreationOptional<number | null>;
  declare confidence: CreationOptional<number | null>;
  declare eventHz: CreationOptional<number | null>;
  declare eventsPerTurn: number;
  declare noRotationReason: CreationOptional<NoRotationReason | null>;
  declare candidates: Candidate[];
  declare warnings: ReadingWarning[];
  declare durationSeconds: number;
  declare sampleRateHz: number;
  declare elapsedSeconds: number;
  declare createdAt: CreationOptional<Date>;
}

Reading.init(
  {
    id: idColumn(),
    benchId: referenceColumn(),
    recordingId: referenceColumn(),
    engineVersion: { type: DataTypes.STRING(40), allowNull: false },
    settingsHash: binaryColumn(),
    settings: { type: DataTypes.JSON, allowNull: false },
    status: { type: DataTypes.ENUM('measured', 'no-rotation'), allowNull: false },
    motion: { type: DataTypes.ENUM(...MOTIONS), allowNull: false },
    shaftSpeedRpm: optionalNumberColumn(),
    lowRpm: optionalNumberColumn(),
    highRpm: optionalNumberColumn(),
    confidence: optionalNumberColumn(),
    eventHz: optionalNumberColumn(),
    eventsPerTurn: { type: DataTypes.DOUBLE, allowNull: false },
    noRotationReason: { type: DataTypes.STRING(40), allowNull: true, defaultValue: null },
    candidates: { type: DataTypes.JSON, allowNull: false },
    warnings: { type: DataTypes.JSON, allowNull: false },
    durationSeconds: { type: DataTypes.DOUBLE, allowNull: false },
    sampleRateHz: { type: DataTypes.DOUBLE, allowNull: false },
    elapsedSeconds: { type: DataTypes.DOUBLE, allowNull: false },
    createdAt: timeColumn(),
  },
  { sequelize: database, modelName: 'reading', tableName: 'readings', updatedAt: false },
);
