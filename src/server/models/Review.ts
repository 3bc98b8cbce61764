import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type NonAttribute,
} from 'sequelize';
import { REVIEW_DECISIONS, type ReviewDecision } from '#lib/schemas/reading.ts';
import { database } from '../database/connection.ts';
import { Account } from './Account.ts';
import { idColumn, optionalNumberColumn, referenceColumn, timeColumn } from './columns.ts';

/** What a person said about a reading. The newest counts; the machine's reading is kept. */
export class Review extends Model<InferAttributes<Review>, InferCreationAttributes<Review>> {
  declare id: CreationOptional<string>;
  declare benchId: string;
  declare recordingId: string;
  declare readingId: string;
  declare reviewerId: string;
  declare decision: ReviewDecision;
  declare shaftSpeedRpm: CreationOptional<number | null>;
  declare reason: string;
  declare createdAt: CreationOptional<Date>;
  declare reviewer?: NonAttribute<Account>;

  static async loadWithReviewer(where: { readonly id: string; readonly benchId: string }): Promise<ReviewWithReviewer> {
    const review = await Review.findOne({ where, include: [WITH_REVIEWER], rejectOnEmpty: true });
    return review as ReviewWithReviewer;
  }

  /** Of each of these readings the review that counts, by the id of the reading. */
  static async listNewestByReadings(
    benchIds: readonly string[],
    readingIds: readonly string[],
  ): Promise<Map<string, ReviewWithReviewer>> {
    if (readingIds.length === 0) return new Map();
    const reviews = await Review.findAll({
      where: { benchId: [...benchIds], readingId: [...readingIds] },
      include: [WITH_REVIEWER],
      order: [
        ['createdAt', 'ASC'],
        ['id', 'ASC'],
      ],
    });
    // Later entries take the place of earlier ones.
    return new Map(reviews.map((review) => [review.readingId, review as ReviewWithReviewer]));
  }
}

const WITH_REVIEWER = { association: 'reviewer', attributes: ['id', 'name'], required: true };

export type ReviewWithReviewer = Review & { reviewer: Account };

Review.init(
  {
    id: idColumn(),
    benchId: referenceColumn(),
    recordingId: referenceColumn(),
    readingId: referenceColumn(),
    reviewerId: referenceColumn(),
    decision: { type: DataTypes.ENUM(...REVIEW_DECISIONS), allowNull: false },
    shaftSpeedRpm: optionalNumberColumn(),
    reason: { type: DataTypes.STRING(2000), allowNull: false },
    createdAt: timeColumn(),
  },
  { sequelize: database, modelName: 'review', tableName: 'reviews', updatedAt: false },
);

Review.belongsTo(Account, { as: 'reviewer', foreignKey: 'reviewerId' });
