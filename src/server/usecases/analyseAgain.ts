import { fn } from 'sequelize';
import type { AnalysisSettings } from '#lib/analysis/settings.ts';
import type { AnalyseAgainRequest } from '#lib/schemas/reading.ts';
import { inTransaction } from '../database/inTransaction.ts';
import { type FieldError, forbidden, invalidFields } from '../errors.ts';
import { Recording } from '../models/Recording.ts';
import type { RecordingWithRelations } from '../models/recordingDetails.ts';
import type { Actor } from '../policies/actor.ts';
import { recordingPolicy } from '../policies/recordingPolicy.ts';
import { ringWorkers } from '../queue/ringWorkers.ts';
import { announceRecording } from './announceRecording.ts';
import { audit } from './audit.ts';
import { getRecording } from './getRecording.ts';
import { loadReadableRecording, type RecordingDetails } from './recordingDetails.ts';
import { resolveAnalysisSettings } from './resolveAnalysisSettings.ts';
import { settingsHash } from './settingsHash.ts';

interface AnalyseAgain {
  readonly actor: Actor;
  readonly recordingId: string;
  readonly request: AnalyseAgainRequest;
}

type Wish = Partial<AnalysisSettings>;

/**
 * Asks for another analysis of a recording. The newest wish counts: it takes the place of one that waits, and takes
 * the recording away from a worker that is busy with an older one, whose result is then discarded.
 *
 * @throws ServerError not-found, forbidden, invalid-fields
 */
export async function analyseAgain({ actor, recordingId, request }: AnalyseAgain): Promise<RecordingDetails> {
  const recording = await loadReadableRecording(actor, recordingId);
  if (!recordingPolicy.canAnalyseAgain(actor, recording)) throw forbidden();
  refuseImpossible(request, recording);
  const generation = await inTransaction(async (transaction) => {
    const where = { id: recording.id, benchId: recording.benchId };
    const current = await Recording.findOne({ where, transaction, lock: transaction.LOCK.UPDATE, rejectOnEmpty: true });
    const wantedSettings = wishOf(request);
    if (isUnderWay(current, wantedSettings, recording)) return null;
    const next = { generation: current.generation + 1, attempt: 0 };
    const freed = { state: 'queued' as const, fenceToken: null, leaseExpiresAt: null, queuedAt: fn('NOW', 3) };
    const cleared = { errorCode: null, errorMessage: null, decoderCrashCount: 0 };
    await Recording.update({ ...next, ...freed, ...cleared, wantedSettings }, { where, transaction });
    const { benchId, sessionId } = current;
    await announceRecording({ recordingId, benchId, sessionId, ...next }, 'queued', transaction);
    const object = { type: 'recording', id: recordingId };
    await audit({ action: 'recording.requeued', accountId: actor.account.id, benchId, object }, transaction);
    return next.generation;
  });
  if (generation !== null) void ringWorkers({ recordingId, generation });
  return getRecording({ actor, recordingId });
}

/** Pressed twice: what is asked for is what waits or runs already. */
function isUnderWay(current: Recording, wish: Wish, { build }: RecordingWithRelations): boolean {
  if (current.state !== 'queued' && current.state !== 'working') return false;
  const hashFor = (wantedSettings: Wish | null) => {
    const { eventsPerTurn, orders, minimumRpm, maximumRpm } = current;
    const recording = { eventsPerTurn, orders, minimumRpm, maximumRpm, wantedSettings };
    return settingsHash(resolveAnalysisSettings({ recording, build, clockCorrectionPpm: null }));
  };
  return hashFor(current.wantedSettings).equals(hashFor(wish));
}

function wishOf({ rpmMin, rpmMax, ...same }: AnalyseAgainRequest): Wish {
  const given = Object.entries({ ...same, minimumRpm: rpmMin, maximumRpm: rpmMax });
  return Object.fromEntries(given.filter(([, value]) => value !== undefined));
}

function refuseImpossible(request: AnalyseAgainRequest, recording: Recording): void {
  const { channelCount, durationSeconds } = recording;
  const { rpmMin, rpmMax, channel, fromSeconds = 0, toSeconds } = request;
  const errors: FieldError[] = [];
  if (rpmMin !== undefined && rpmMax !== undefined && rpmMin >= rpmMax) {
    errors.push({ field: 'rpmMax', message: 'Must be above rpmMin.' });
  }
  if (typeof channel === 'number' && channelCount !== null && channel >= channelCount) {
    errors.push({ field: 'channel', message: `Must be auto or a number from 0 to ${String(channelCount - 1)}.` });
  }
  if (toSeconds !== undefined && toSeconds <= fromSeconds) {
    errors.push({ field: 'toSeconds', message: 'Must be above fromSeconds.' });
  }
  if (durationSeconds !== null && fromSeconds >= durationSeconds) {
    errors.push({ field: 'fromSeconds', message: `Must be below the length, ${durationSeconds.toFixed(1)} s.` });
  }
  if (errors.length > 0) throw invalidFields(errors);
}
