import type { ReviewView } from '#lib/schemas/reading.ts';
import type { ReviewWithReviewer } from '../models/Review.ts';

export function presentReview(review: ReviewWithReviewer): ReviewView {
  const { id, readingId, decision, shaftSpeedRpm, reason, reviewer, createdAt } = review;
  return {
    ...{ id, readingId, decision, reason },
    rpm: shaftSpeedRpm,
    reviewer: { id: reviewer.id, name: reviewer.name },
    createdAt: createdAt.toISOString(),
  };
}
