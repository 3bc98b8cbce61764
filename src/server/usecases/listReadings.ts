import { Reading } from '../models/Reading.ts';
import { ReadingSeries } from '../models/ReadingSeries.ts';
import type { Actor } from '../policies/actor.ts';
import { loadReadableRecording, type ReadingDetails } from './recordingDetails.ts';

/** Every reading of a recording, newest first. @throws ServerError not-found */
export async function listReadings(wanted: { actor: Actor; recordingId: string }): Promise<ReadingDetails[]> {
  const { id: recordingId, benchId } = await loadReadableRecording(wanted.actor, wanted.recordingId);
  const readings = await Reading.findAll({
    where: { benchId, recordingId },
    order: [
      ['createdAt', 'DESC'],
      ['id', 'DESC'],
    ],
  });
  const readingIds = readings.map(({ id }) => id);
  const seriesNames = await ReadingSeries.listNamesByReadings([benchId], readingIds);
  return readings.map((reading) => ({ reading, seriesNames: seriesNames.get(reading.id) ?? [] }));
}
