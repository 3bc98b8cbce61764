import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type NonAttribute,
  type Transaction,
} from 'sequelize';
import type { ReadingWarning } from '#lib/analysis/reading.ts';
import type { AnalysisSettings } from '#lib/analysis/settings.ts';
import { RECORDING_STATUSES, type RecordingStatus } from '#lib/schemas/recording.ts';
import { database } from '../database/connection.ts';
import { Account } from './Account.ts';
import { Build } from './Build.ts';
import {
  binaryColumn,
  idColumn,
  optionalBinaryColumn,
  optionalNumberColumn,
  optionalReferenceColumn,
  optionalTextColumn,
  optionalTimeColumn,
  referenceColumn,
  timeColumn,
} from './columns.ts';
import { Reading } from './Reading.ts';
import { Session } from './Session.ts';

/**
 * One uploaded file with its conditions and the state of its analysis. `state`, `attempt`, `fenceToken` and
 * `leaseExpiresAt` are the truth of the queue: only the statements in recordingClaims.ts and analyseAgain change them.
 */
export class Recording extends Model<InferAttributes<Recording>, InferCreationAttributes<Recording>> {
  declare id: CreationOptional<string>;
  declare benchId: string;
  declare sessionId: CreationOptional<string | null>;
  declare buildId: CreationOptional<string | null>;
  declare buildRevision: CreationOptional<number | null>;
  declare deviceId: CreationOptional<string | null>;
  declare uploadedBy: string;
  declare fileName: string;
  declare byteCount: number;
  declare sha256: Buffer;
  declare blobId: string;
  declare duplicateOf: CreationOptional<string | null>;
  declare idempotencyKey: CreationOptional<Buffer | null>;
  declare container: string;
  /** What the file says of itself; null where only decoding can tell. */
  declare codec: CreationOptional<string | null>;
  declare sampleRateHz: CreationOptional<number | null>;
  declare channelCount: CreationOptional<number | null>;
  declare durationSeconds: CreationOptional<number | null>;
  declare mediaWarnings: CreationOptional<ReadingWarning[]>;
  declare eventsPerTurn: CreationOptional<number | null>;
  declare orders: CreationOptional<number[] | null>;
  declare minimumRpm: CreationOptional<number | null>;
  declare maximumRpm: CreationOptional<number | null>;
  declare wantedSettings: CreationOptional<Partial<AnalysisSettings> | null>;
  declare supplyVolts: CreationOptional<number | null>;
  declare currentAmps: CreationOptional<number | null>;
  declare note: CreationOptional<string | null>;
  declare state: CreationOptional<RecordingStatus>;
  declare priority: CreationOptional<'interactive' | 'batch'>;
  declare generation: CreationOptional<number>;
  declare attempt: CreationOptional<number>;
  declare decoderCrashCount: CreationOptional<number>;
  declare fenceToken: CreationOptional<Buffer | null>;
  declare leaseExpiresAt: CreationOptional<Date | null>;
  declare queuedAt: CreationOptional<Date>;
  declare errorCode: CreationOptional<string | null>;
  declare errorMessage: CreationOptional<string | null>;
  declare currentReadingId: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
  declare session?: NonAttribute<Session | null>;
  declare build?: NonAttribute<Build | null>;
  declare uploader?: NonAttribute<Account>;
  declare currentReading?: NonAttribute<Reading | null>;

  static loadByIdempotencyKey(
    key: { readonly benchId: string; readonly idempotencyKey: Buffer },
    transaction: Transaction | null = null,
  ): Promise<Recording | null> {
    return Recording.findOne({ where: key, transaction });
  }

  /** Bytes of all originals of a bench. */
  static async sumBytes(benchId: string): Promise<number> {
    const total: unknown = await Recording.sum('byteCount', { where: { benchId } });
    // A sum of BIGINT arrives as text; null without rows.
    return Number(total ?? 0);
  }

  /** The first of the bench with these very bytes. */
  static loadOldestBySha256(
    bytes: { readonly benchId: string; readonly sha256: Buffer },
    transaction: Transaction | null = null,
  ): Promise<Recording | null> {
    const order: [string, string][] = [
      ['createdAt', 'ASC'],
      ['id', 'ASC'],
    ];
    return Recording.findOne({ where: bytes, order, transaction });
  }
}

Recording.init(
  {
    id: idColumn(),
    benchId: referenceColumn(),
    sessionId: optionalReferenceColumn(),
    buildId: optionalReferenceColumn(),
    buildRevision: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true, defaultValue: null },
    deviceId: optionalReferenceColumn(),
    uploadedBy: referenceColumn(),
    fileName: { type: DataTypes.STRING(255), allowNull: false },
    byteCount: {
      type: DataTypes.BIGINT.UNSIGNED,
      allowNull: false,
      // BIGINT arrives as a string; the upload limit keeps it far below 2^53.
      get() {
        return Number(String(this.getDataValue('byteCount')));
      },
    },
    sha256: binaryColumn(),
    blobId: referenceColumn(),
    duplicateOf: optionalReferenceColumn(),
    idempotencyKey: optionalBinaryColumn(),
    container: { type: DataTypes.STRING(40), allowNull: false },
    codec: { type: DataTypes.STRING(40), allowNull: true, defaultValue: null },
    sampleRateHz: optionalNumberColumn(),
    channelCount: { type: DataTypes.SMALLINT.UNSIGNED, allowNull: true, defaultValue: null },
    durationSeconds: optionalNumberColumn(),
    mediaWarnings: { type: DataTypes.JSON, allowNull: false, defaultValue: [] },
    eventsPerTurn: optionalNumberColumn(),
    orders: { type: DataTypes.JSON, allowNull: true, defaultValue: null },
    minimumRpm: optionalNumberColumn(),
    maximumRpm: optionalNumberColumn(),
    wantedSettings: { type: DataTypes.JSON, allowNull: true, defaultValue: null },
    supplyVolts: optionalNumberColumn(),
    currentAmps: optionalNumberColumn(),
    note: optionalTextColumn(),
    state: { type: DataTypes.ENUM(...RECORDING_STATUSES), allowNull: false, defaultValue: 'queued' },
    priority: { type: DataTypes.ENUM('interactive', 'batch'), allowNull: false, defaultValue: 'interactive' },
    generation: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 1 },
    attempt: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 0 },
    decoderCrashCount: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 0 },
    fenceToken: optionalBinaryColumn(),
    leaseExpiresAt: optionalTimeColumn(),
    // Left to the database, whose clock the queue is judged by
    queuedAt: { type: timeColumn() },
    errorCode: { type: DataTypes.STRING(64), allowNull: true, defaultValue: null },
    errorMessage: { type: DataTypes.STRING(1000), allowNull: true, defaultValue: null },
    currentReadingId: optionalReferenceColumn(),
    createdAt: timeColumn(),
    updatedAt: timeColumn(),
  },
  { sequelize: database, modelName: 'recording', tableName: 'recordings' },
);

Recording.belongsTo(Session, { as: 'session', foreignKey: 'sessionId' });
Recording.belongsTo(Build, { as: 'build', foreignKey: 'buildId' });
Recording.belongsTo(Account, { as: 'uploader', foreignKey: 'uploadedBy' });
Recording.belongsTo(Reading, { as: 'currentReading', foreignKey: 'currentReadingId', constraints: false });
