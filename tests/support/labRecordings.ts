/** Recordings for the tests of the worker. Import it after the lab is open: it reads the settings. */
import { createReadStream } from 'node:fs';
import { basename } from 'node:path';
import { QueryTypes } from 'sequelize';
import type { UploadFields } from '#lib/schemas/recording.ts';
import { database } from '#server/database/connection.ts';
import { Account } from '#server/models/Account.ts';
import { Bench } from '#server/models/Bench.ts';
import { Membership } from '#server/models/Membership.ts';
import { OutboxEvent } from '#server/models/OutboxEvent.ts';
import { Reading } from '#server/models/Reading.ts';
import { Recording } from '#server/models/Recording.ts';
import type { Actor } from '#server/policies/actor.ts';
import { blobStorage } from '#server/storage/blobStorage.ts';
import { writeHashed } from '#server/storage/writeHashed.ts';
import { createRecording } from '#server/usecases/createRecording.ts';
import { until } from './workerLab.ts';

const UPLOAD_LIMIT_BYTES = 200_000_000;
let accountCount = 0;

/** A member alone on a new bench. */
export async function addBench(): Promise<Actor> {
  accountCount += 1;
  const email = `member${String(accountCount)}@lab.example`;
  const bench = await Bench.create({ name: `Lab ${String(accountCount)}` });
  const { id, name } = await Account.create({ email, name: 'Lab member' });
  await Membership.create({ benchId: bench.id, accountId: id, role: 'member' });
  const membership = { benchId: bench.id, benchName: bench.name, role: 'member' } as const;
  return { account: { id, email, name }, memberships: [membership], via: 'session', access: 'write' };
}

export function benchIdOf({ memberships: [membership] }: Actor): string {
  if (!membership) throw new Error('benchIdOf: the actor has no bench');
  return membership.benchId;
}

/** Uploads a file as the endpoint does. @returns the acknowledged recording */
export async function upload(actor: Actor, path: string, fields: UploadFields = {}): Promise<Recording> {
  const temporary = await blobStorage().createTemporary();
  const written = await writeHashed({
    source: createReadStream(path),
    target: temporary,
    maximumBytes: UPLOAD_LIMIT_BYTES,
    tooLarge: () => new Error('The test file is too large.'),
  });
  const { recording } = await createRecording({
    actor,
    upload: { temporary, fileName: basename(path), ...written },
    fields,
    idempotencyKey: null,
  });
  return recording;
}

/** The recording as it stands in the database now. */
export async function reload({ id, benchId }: Recording): Promise<Recording> {
  return Recording.findOne({ where: { id, benchId }, rejectOnEmpty: true });
}

/** Waits until the recording is in that state. */
export function untilState(
  recording: Recording,
  state: Recording['state'],
  deadlineSeconds?: number,
): Promise<Recording> {
  const look = async (): Promise<Recording | null> => {
    const now = await reload(recording);
    return now.state === state ? now : null;
  };
  return until(`recording ${recording.fileName} is ${state}`, look, deadlineSeconds);
}

export function readingsOf({ id: recordingId, benchId }: Recording): Promise<Reading[]> {
  return Reading.findAll({ where: { recordingId, benchId } });
}

/** The states that pages were told of, in order. */
export async function toldStates({ id, benchId }: Recording): Promise<string[]> {
  const events = await OutboxEvent.findAll({ where: { benchId }, order: [['id', 'ASC']] });
  const payloads = events.map(({ payload }) => payload as { recordingId: string; status: string });
  return payloads.filter(({ recordingId }) => recordingId === id).map(({ status }) => status);
}

/** Puts the recording back into the queue, as a wish for the same analysis once more. */
export async function wishAgain({ id, benchId }: Recording): Promise<void> {
  await database.query(
    `UPDATE recordings SET state = 'queued', attempt = 0, generation = generation + 1 WHERE id = :id AND bench_id = :benchId`,
    { type: QueryTypes.UPDATE, replacements: { id, benchId } },
  );
}
