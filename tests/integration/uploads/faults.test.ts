import { randomUUID } from 'node:crypto';
import { mkdtemp, readdir, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeEach, describe, expect, it } from 'vitest';
import { receiveUpload } from '#http/receiveUpload.ts';
import { ServerError } from '#server/errors.ts';
import { Recording } from '#server/models/Recording.ts';
import type { Actor } from '#server/policies/actor.ts';
import { FileStorage } from '#server/storage/fileStorage.ts';
import type { BlobStorage } from '#server/storage/storage.ts';
import { createRecording } from '#server/usecases/createRecording.ts';
import { createBenchWithAccounts, type TestBench } from '#tests/factories/account.ts';
import { wavFile } from '#tests/factories/wavFile.ts';
import { faultyStorage, STORAGE_STEPS } from '#tests/support/faultyStorage.ts';
import { tracesOf } from '#tests/support/traces.ts';
import { watchStatements } from '#tests/support/watchStatements.ts';

const folder = await mkdtemp(join(tmpdir(), 'ripplebench-faults-'));
const storage = new FileStorage(folder);
let bench: TestBench;
let actor: Actor;

beforeEach(async () => {
  bench = await createBenchWithAccounts();
  const { id, email, name } = bench.member;
  const membership = { benchId: bench.benchId, benchName: bench.benchName, role: 'member' } as const;
  actor = { account: { id, email, name }, memberships: [membership], via: 'token', access: 'write' };
});
afterAll(() => rm(folder, { recursive: true }));

/** The path of an upload from the request to the row, over a storage of the test's choice. */
async function takeUpload(through: BlobStorage, key: string | null = null) {
  const body = new FormData();
  body.append('file', new Blob([wavFile({ seed: 700 })]), 'run.wav');
  const request = new Request('http://bench.test/api/v1/recordings', { method: 'POST', body });
  const { upload } = await receiveUpload(request, { storage: through, beforeFile: () => Promise.resolve() });
  return createRecording({ actor, upload, fields: {}, idempotencyKey: key, storage: through });
}

const filesIn = async (name: string): Promise<string[]> => {
  const entries = await readdir(join(folder, name), { recursive: true, withFileTypes: true }).catch(() => []);
  return entries.filter((entry) => entry.isFile()).map((entry) => entry.name);
};

async function codeOf(work: Promise<unknown>): Promise<string> {
  try {
    await work;
    return 'no error';
  } catch (error) {
    return error instanceof ServerError ? error.code : String(error);
  }
}

describe('an upload over a failing disk', () => {
  const codes = [
    ['ENOSPC', 'storage-full'],
    ['EDQUOT', 'storage-full'],
    ['EIO', 'storage-unavailable'],
    ['EROFS', 'storage-unavailable'],
  ] as const;
  const faults = STORAGE_STEPS.flatMap((step) => codes.map(([code, answer]) => ({ step, code, answer })));

  it.each(faults)(
    'answers $answer for $code in $step, and keeps neither row nor file',
    async ({ step, code, answer }) => {
      const blobsBefore = await filesIn('blobs');
      expect(await codeOf(takeUpload(faultyStorage(storage, { step, code })))).toBe(answer);
      expect(await tracesOf(bench.benchId)).toEqual({ recordings: 0, events: 0, audits: 0 });
      expect(await filesIn('tmp')).toEqual([]);
      expect(await filesIn('blobs')).toEqual(blobsBefore);
    },
  );

  it('leaves at worst a file without a row when it fails after the rename, and takes the retry', async () => {
    const fault = { step: 'commit', code: 'EIO', when: 'after' } as const;
    expect(await codeOf(takeUpload(faultyStorage(storage, fault), 'retried'))).toBe('storage-unavailable');
    expect(await tracesOf(bench.benchId)).toEqual({ recordings: 0, events: 0, audits: 0 });
    const { created } = await takeUpload(storage, 'retried');
    expect(created).toBe(true);
    expect((await takeUpload(storage, 'retried')).created).toBe(false);
  });

  it('names no path in what it says', async () => {
    const error = await takeUpload(faultyStorage(storage, { step: 'write', code: 'ENOSPC' })).catch((e: unknown) => e);
    expect(error).toBeInstanceOf(ServerError);
    expect((error as ServerError).detail).not.toMatch(/\/|ENOSPC/);
  });
});

describe('an upload over a full disk', () => {
  it('is refused with the numbers while there is little room, before the body is read', async () => {
    const nearlyFull: BlobStorage = Object.assign(faultyStorage(storage, { step: 'write', code: 'EIO' }), {
      freeSpace: () => Promise.resolve({ freeBytes: 4_000_000_000, totalBytes: 100_000_000_000 }),
    });
    const error = await takeUpload(nearlyFull).catch((e: unknown) => e);
    expect((error as ServerError).code).toBe('storage-full');
    expect((error as ServerError).detail).toMatch(/^4000 MB are free .* 5000 MB must stay free/);
    expect((error as ServerError).retryAfterSeconds).toBeGreaterThan(0);
  });
});

describe('an upload over a failing database', () => {
  const failing = (pattern: RegExp, reason: string) =>
    watchStatements((statement) => {
      if (pattern.test(statement)) throw new Error(reason);
    });

  it.each([
    ['the lock of the membership', /FROM `memberships`.*FOR UPDATE/],
    ['the row', /INSERT INTO `recordings`/],
    ['the event', /INSERT (?:IGNORE )?INTO `outbox`/],
    ['the audit line', /INSERT INTO `audit_log`/],
  ])('keeps neither row nor file when %s fails', async (_, pattern) => {
    const blobsBefore = await filesIn('blobs');
    const restore = failing(pattern, 'injected');
    try {
      expect(await codeOf(takeUpload(storage))).toBe('Error: injected');
    } finally {
      restore();
    }
    expect(await tracesOf(bench.benchId)).toEqual({ recordings: 0, events: 0, audits: 0 });
    expect(await filesIn('tmp')).toEqual([]);
    expect(await filesIn('blobs')).toEqual(blobsBefore);
  });

  it('keeps the file when COMMIT gives no answer, so that a row that is there has it; the retry makes one row', async () => {
    const key = randomUUID();
    const restore = failing(/: COMMIT;$/, 'the connection broke at COMMIT');
    const blobsBefore = new Set(await filesIn('blobs'));
    try {
      expect(await codeOf(takeUpload(storage, key))).toMatch(/COMMIT/);
    } finally {
      restore();
    }
    const kept = (await filesIn('blobs')).filter((id) => !blobsBefore.has(id));
    expect(kept).toHaveLength(1);
    await takeUpload(storage, key);
    const rows = await Recording.findAll({ where: { benchId: bench.benchId } });
    expect(rows).toHaveLength(1);
    expect(await filesIn('blobs')).toContain(rows[0]?.blobId);
  });
});

describe('a bench with too much', () => {
  it('refuses the 1001st waiting recording with 429, the numbers and when to try again, but not a repeated one', async () => {
    const { recording } = await takeUpload(storage, 'first');
    // More than enough, because the worker of the test run may take some of them at once.
    const rows = Array.from({ length: 1200 }, () => ({
      ...recording.get(),
      id: randomUUID(),
      idempotencyKey: null,
      state: 'queued' as const,
    }));
    await Recording.bulkCreate(rows);
    const error = await takeUpload(storage).catch((e: unknown) => e);
    const again = await takeUpload(storage, 'first');
    await Recording.destroy({ where: { benchId: bench.benchId } });
    expect((error as ServerError).code).toBe('too-many-waiting');
    expect((error as ServerError).detail).toMatch(/^1\d{3} recordings .* at most 1000 may/);
    expect((error as ServerError).retryAfterSeconds).toBeGreaterThan(0);
    expect(again.created).toBe(false);
  });

  it('refuses what goes beyond 5 GB with 507 and the numbers', async () => {
    const { recording } = await takeUpload(storage);
    const where = { id: recording.id, benchId: bench.benchId };
    await Recording.update({ byteCount: 4_999_999_999 }, { where });
    const error = await takeUpload(storage).catch((e: unknown) => e);
    expect((error as ServerError).code).toBe('storage-full');
    expect((error as ServerError).detail).toMatch(/of at most 5000 MB/);
  });
});
