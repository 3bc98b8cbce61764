import { readdirSync, utimesSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createMediaFolder } from '#tests/fixtures/media/makeMedia.ts';
import { makeBuzz } from '#tests/support/labSounds.ts';
import { openWorkerLab } from '#tests/support/workerLab.ts';

const lab = await openWorkerLab();
const { addBench, reload, toldStates, upload } = await import('#tests/support/labRecordings.ts');
const { settings } = await import('#server/env.ts');
const { blobStorage } = await import('#server/storage/blobStorage.ts');
const { sweepStorage } = await import('#server/usecases/sweepStorage.ts');

const folder = await createMediaFolder();
const storageFolder = (...names: string[]): string => join(settings().dataFolder, 'storage', ...names);
let actor: Awaited<ReturnType<typeof addBench>>;
let path = '';

/** Makes a file look as old as that. */
function age(file: string, hours: number): void {
  const changed = new Date(Date.now() - hours * 3_600_000);
  utimesSync(file, changed, changed);
}

async function committedBlob(): Promise<string> {
  const temporary = await blobStorage().createTemporary();
  await temporary.write(Buffer.from('no row names this'));
  await temporary.finish();
  return blobStorage().commit(temporary);
}

const blobPath = (blobId: string): Promise<string> => blobStorage().pathForReading(blobId);

beforeAll(async () => {
  actor = await addBench();
  path = await makeBuzz(folder, 'short.wav', 1);
});
afterAll(async () => {
  await lab.close();
  await folder.remove();
});

describe('sweepStorage', () => {
  it('fails no recording when the storage is empty, as an unmounted volume is', async () => {
    const recording = await upload(actor, path);
    await blobStorage().remove(recording.blobId);
    await expect(sweepStorage()).rejects.toThrow(/mounted/);
    expect(await reload(recording)).toMatchObject({ state: 'queued', errorCode: null });
  });

  it('fails a recording whose file is gone with file-missing, once, and tells the pages', async () => {
    const [kept, gone] = [await upload(actor, path), await upload(actor, path)];
    await sweepStorage();
    await blobStorage().remove(gone.blobId);
    expect(await sweepStorage()).toMatchObject({ missingCount: 1 });
    expect(await reload(gone)).toMatchObject({ state: 'failed', errorCode: 'file-missing' });
    expect(await reload(kept)).toMatchObject({ state: 'queued' });
    expect(await toldStates(gone)).toEqual(['queued', 'failed']);
    expect(await sweepStorage()).toMatchObject({ missingCount: 0 });
  });

  it('sets a file without a row aside after 24 h, not before, and leaves files with a row', async () => {
    const [young, old] = [await committedBlob(), await committedBlob()];
    const named = await upload(actor, path);
    age(await blobPath(young), 23);
    age(await blobPath(old), 25);
    age(await blobPath(named.blobId), 25);
    expect(await sweepStorage()).toMatchObject({ quarantinedCount: 1 });
    expect(readdirSync(storageFolder('quarantine'))).toEqual([old]);
    await expect(blobPath(old)).rejects.toMatchObject({ code: 'file-missing' });
    expect(await blobPath(young)).toContain(young);
    expect(await blobPath(named.blobId)).toContain(named.blobId);
  });

  it('removes what an upload left behind after an hour, not before', async () => {
    const [running, cut] = [await blobStorage().createTemporary(), await blobStorage().createTemporary()];
    age(running.pathForReading, 0.9);
    age(cut.pathForReading, 1.1);
    expect(await sweepStorage()).toMatchObject({ removedTemporaryCount: 1 });
    expect(readdirSync(storageFolder('tmp'))).toHaveLength(1);
    await running.discard();
    await cut.discard();
  });
});
