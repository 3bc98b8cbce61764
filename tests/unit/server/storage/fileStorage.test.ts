import { createHash } from 'node:crypto';
import { mkdtemp, readdir, readFile, rm, stat, utimes, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { ServerError } from '#server/errors.ts';
import { FileStorage } from '#server/storage/fileStorage.ts';
import { writeHashed } from '#server/storage/writeHashed.ts';

const NO_BLOB = '00000000-0000-4000-8000-000000000000';
const BYTES = Buffer.from('a recording of a motor');

let folder: string;
let storage: FileStorage;

beforeEach(async () => {
  folder = await mkdtemp(join(tmpdir(), 'ripplebench-storage-'));
  storage = new FileStorage(folder);
});
afterEach(() => rm(folder, { recursive: true }));

async function storeBlob(bytes: Uint8Array = BYTES): Promise<string> {
  const temporary = await storage.createTemporary();
  await temporary.write(bytes);
  await temporary.finish();
  return storage.commit(temporary);
}

async function bytesOf(stream: NodeJS.ReadableStream): Promise<Buffer> {
  const chunks: Buffer[] = [];
  for await (const chunk of stream) chunks.push(chunk as Buffer);
  return Buffer.concat(chunks);
}

const namesIn = (name: string): Promise<string[]> => readdir(join(folder, name)).catch(() => []);

describe('FileStorage', () => {
  it('gives back the bytes, whole and by range, and never lets them be written again', async () => {
    const blobId = await storeBlob();
    const blob = await storage.open(blobId);
    expect(blob.byteCount).toBe(BYTES.length);
    expect(await bytesOf(blob.read())).toEqual(BYTES);
    expect(await bytesOf(blob.read({ firstByte: 2, lastByte: 10 }))).toEqual(BYTES.subarray(2, 11));
    expect((await stat(await storage.pathForReading(blobId))).mode & 0o777).toBe(0o440);
    expect(await namesIn('tmp')).toEqual([]);
  });

  it('shows nothing before the commit and nothing after a discard', async () => {
    const temporary = await storage.createTemporary();
    await temporary.write(BYTES);
    expect(await namesIn('tmp')).toHaveLength(1);
    expect(await namesIn('blobs')).toEqual([]);
    await temporary.discard();
    await temporary.discard();
    expect(await namesIn('tmp')).toEqual([]);
  });

  it('leaves a committed blob alone when its temporary is discarded afterwards', async () => {
    const temporary = await storage.createTemporary();
    await temporary.write(BYTES);
    await temporary.finish();
    const blobId = await storage.commit(temporary);
    await temporary.discard();
    expect(await storage.byteCount(blobId)).toBe(BYTES.length);
  });

  it.each(['open', 'byteCount', 'pathForReading', 'quarantine'] as const)(
    '%s says file-missing for a blob that is gone',
    async (method) => {
      const error = await storage[method](NO_BLOB).catch((thrown: unknown) => thrown);
      expect(error).toBeInstanceOf(ServerError);
      expect((error as ServerError).code).toBe('file-missing');
      expect((error as ServerError).detail).not.toContain(folder);
    },
  );

  it.each(['../../etc/passwd', '', 'ab', NO_BLOB.toUpperCase().replace('8000', 'ABCD')])(
    'refuses %j as a blob id',
    async (blobId) => {
      await expect(storage.open(blobId)).rejects.toThrow(/blobId must be a UUID/);
    },
  );

  it('removes a blob with what was made of it, and a second time nothing', async () => {
    const blobId = await storeBlob();
    await storage.derivative(blobId, 'playback', (path) => writeFile(path, 'sound'));
    await storage.remove(blobId);
    await storage.remove(blobId);
    await expect(storage.open(blobId)).rejects.toThrow(/file-missing/);
    const left = await readdir(join(folder, 'derivatives'), { recursive: true, withFileTypes: true });
    expect(left.filter((entry) => entry.isFile())).toEqual([]);
  });

  it('makes a derivative once for five who ask at once, and again when it is missing', async () => {
    const blobId = await storeBlob();
    let buildCount = 0;
    const build = async (path: string) => {
      buildCount += 1;
      await writeFile(path, `sound ${String(buildCount)}`);
    };
    const made = await Promise.all(Array.from({ length: 5 }, () => storage.derivative(blobId, 'playback', build)));
    expect(buildCount).toBe(1);
    for (const blob of made) expect((await bytesOf(blob.read())).toString()).toBe('sound 1');
    await rm(join(folder, 'derivatives'), { recursive: true });
    expect((await bytesOf((await storage.derivative(blobId, 'playback', build)).read())).toString()).toBe('sound 2');
  });

  it('keeps nothing of a derivative that could not be made, and tries again', async () => {
    const blobId = await storeBlob();
    const failing = async (path: string) => {
      await writeFile(path, 'half');
      throw new Error('no sound');
    };
    await expect(storage.derivative(blobId, 'playback', failing)).rejects.toThrow('no sound');
    expect(await namesIn('tmp')).toEqual([]);
    const blob = await storage.derivative(blobId, 'playback', (path) => writeFile(path, 'sound'));
    expect(blob.byteCount).toBe(5);
  });

  it('lists blobs with their age by the clock of the file system', async () => {
    const young = await storeBlob();
    const old = await storeBlob();
    const twoDaysAgo = Date.now() / 1000 - 172_800;
    await utimes(await storage.pathForReading(old), twoDaysAgo, twoDaysAgo);
    const ages = new Map<string, number>();
    for await (const { blobId, ageSeconds } of storage.list()) ages.set(blobId, ageSeconds);
    expect([...ages.keys()].sort()).toEqual([young, old].sort());
    // A second for the file system's own granularity, a few for a busy machine.
    expect(Math.abs(ages.get(young) ?? -99)).toBeLessThan(10);
    expect(Math.abs((ages.get(old) ?? 0) - 172_800)).toBeLessThan(10);
  });

  it('sets a blob aside where no reader finds it and a person does', async () => {
    const blobId = await storeBlob();
    await storage.quarantine(blobId);
    await expect(storage.open(blobId)).rejects.toThrow(/file-missing/);
    expect(await readFile(join(folder, 'quarantine', blobId))).toEqual(BYTES);
  });

  it('sweeps temporary files of over an hour and leaves those on their way in', async () => {
    const [forgotten, current] = [await storage.createTemporary(), await storage.createTemporary()];
    const twoHoursAgo = Date.now() / 1000 - 7200;
    await utimes(forgotten.pathForReading, twoHoursAgo, twoHoursAgo);
    expect(await storage.sweepTemporary(3600)).toBe(1);
    expect(await namesIn('tmp')).toEqual([current.pathForReading.split('/').at(-1)]);
    await Promise.all([forgotten.discard(), current.discard()]);
  });

  it('tells the free space of its disk', async () => {
    const { freeBytes, totalBytes } = await storage.freeSpace();
    expect(freeBytes).toBeGreaterThan(0);
    expect(totalBytes).toBeGreaterThanOrEqual(freeBytes);
  });

  it('says storage-unavailable when its folder cannot be one', async () => {
    const path = join(folder, 'file');
    await writeFile(path, '');
    const broken = new FileStorage(path);
    await expect(broken.createTemporary()).rejects.toThrow(/storage-unavailable/);
    await expect(broken.freeSpace()).rejects.toThrow(/storage-unavailable/);
  });
});

describe('writeHashed', () => {
  const tooLarge = () => new Error('too large');
  async function* chunks(...texts: string[]) {
    for (const text of texts) yield await Promise.resolve(Buffer.from(text));
  }

  it('gives the length and the SHA-256 of all chunks, up to the last allowed byte', async () => {
    const target = await storage.createTemporary();
    const written = await writeHashed({ source: chunks('abc', '', 'def'), target, maximumBytes: 6, tooLarge });
    // FIPS 180-4 by an implementation of its own: OpenSSL, through Node.
    expect(written).toEqual({ byteCount: 6, sha256: createHash('sha256').update('abcdef').digest() });
    expect(await readFile(target.pathForReading, 'utf8')).toBe('abcdef');
    await target.discard();
  });

  it('stops at the first chunk beyond the limit and writes nothing of it', async () => {
    const target = await storage.createTemporary();
    const writing = writeHashed({ source: chunks('abc', 'def'), target, maximumBytes: 5, tooLarge });
    await expect(writing).rejects.toThrow('too large');
    expect(await readFile(target.pathForReading, 'utf8')).toBe('abc');
    await target.discard();
  });
});
