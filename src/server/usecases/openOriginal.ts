import type { Actor } from '../policies/actor.ts';
import { blobStorage } from '../storage/blobStorage.ts';
import type { ReadableBlob } from '../storage/storage.ts';
import { loadReadableRecording } from './recordingDetails.ts';

export interface OpenedOriginal {
  readonly blob: ReadableBlob;
  readonly fileName: string;
  /** Names the bytes, for caches. */
  readonly sha256: Buffer;
}

/** The file as it was uploaded. @throws ServerError not-found, file-missing, storage-unavailable */
export async function openOriginal(wanted: { actor: Actor; recordingId: string }): Promise<OpenedOriginal> {
  const { blobId, fileName, sha256 } = await loadReadableRecording(wanted.actor, wanted.recordingId);
  return { blob: await blobStorage().open(blobId), fileName, sha256 };
}
