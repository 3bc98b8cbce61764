import * as z from 'zod/mini';
import { RECORDING_STATUSES } from './recording.ts';

/** One server-sent event: something that the reader may see has changed; the page then fetches the truth. */
export const updateEvent = z.object({
  topic: z.literal('recording'),
  recordingId: z.uuid(),
  sessionId: z.nullable(z.uuid()),
  benchId: z.uuid(),
  status: z.enum(RECORDING_STATUSES),
});
export type UpdateEvent = z.infer<typeof updateEvent>;
