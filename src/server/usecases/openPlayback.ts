import { ServerError } from '../errors.ts';
import { DecoderCrashed, MediaRefused, MediaUnreadable } from '../media/mediaErrors.ts';
import { probeMedia } from '../media/probeMedia.ts';
import { PLAYBACK_MEDIA_TYPE, transcodeForPlayback } from '../media/transcodeForPlayback.ts';
import type { Actor } from '../policies/actor.ts';
import { blobStorage } from '../storage/blobStorage.ts';
import type { ReadableBlob } from '../storage/storage.ts';
import { loadReadableRecording } from './recordingDetails.ts';

export interface OpenedPlayback {
  readonly blob: ReadableBlob;
  readonly mediaType: string;
  readonly sha256: Buffer;
}

/**
 * Sound for the player of a page, made from the original on first use: no browser decodes what a stranger uploaded.
 *
 * @throws ServerError not-found, cannot-decode, truncated, file-missing, storage-unavailable
 */
export async function openPlayback(wanted: { actor: Actor; recordingId: string }): Promise<OpenedPlayback> {
  const { blobId, sha256 } = await loadReadableRecording(wanted.actor, wanted.recordingId);
  const path = await blobStorage().pathForReading(blobId);
  try {
    const blob = await blobStorage().derivative(blobId, 'playback', async (outputPath) =>
      transcodeForPlayback(path, await probeMedia(path), outputPath),
    );
    return { blob, mediaType: PLAYBACK_MEDIA_TYPE, sha256 };
  } catch (error) {
    throw asUnreadable(error);
  }
}

function asUnreadable(error: unknown): unknown {
  if (error instanceof MediaUnreadable || error instanceof MediaRefused) {
    return new ServerError({ code: error.code, detail: error.message, cause: error });
  }
  if (!(error instanceof DecoderCrashed)) return error;
  return new ServerError({ code: 'cannot-decode', detail: error.message, cause: error });
}
