import { defineEndpoint } from '#http/defineEndpoint.ts';
import { json } from '#http/json.ts';
import { reviewRequest } from '#lib/schemas/reading.ts';
import { presentReview } from '#server/presenters/presentReview.ts';
import { reviewReading } from '#server/usecases/reviewReading.ts';

export const POST = defineEndpoint({
  call: 'POST /api/v1/readings/[id]/reviews',
  body: reviewRequest,
  handle: async ({ actor, parameter, body }) => {
    const review = await reviewReading({ actor, readingId: parameter('id'), request: body });
    return json(presentReview(review), { status: 201, location: `/api/v1/recordings/${review.recordingId}` });
  },
});
