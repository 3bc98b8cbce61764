import type { UploadResponse } from '#lib/schemas/recording.ts';
import type { Recording } from '../models/Recording.ts';

/** The acknowledgement of an upload. It says `queued` also when it is given again later: the same key, the same body. */
export function presentUpload(recording: Recording): UploadResponse {
  const { id, fileName, sha256, duplicateOf } = recording;
  return { recordings: [{ id, fileName, sha256: sha256.toString('hex'), status: 'queued', duplicateOf }] };
}
