import type { APIContext } from 'astro';
import { forbidden } from '#server/errors.ts';
import { countUpload } from '#server/metrics.ts';
import { canInBench } from '#server/policies/abilities.ts';
import type { Actor } from '#server/policies/actor.ts';
import { blobStorage } from '#server/storage/blobStorage.ts';
import { benchToWriteIn } from '#server/usecases/benchChoice.ts';
import { createRecording, type CreatedRecording, keyBytes } from '#server/usecases/createRecording.ts';
import { placeUpload } from '#server/usecases/placeUpload.ts';
import { receiveUpload } from './receiveUpload.ts';
import { reloadActor } from './reloadActor.ts';
import { type FormTexts, parseUploadFields } from './upload/parseUploadFields.ts';

/**
 * One upload from its first byte to its row. What can be refused before the file has come in is refused then.
 *
 * @throws ServerError of receiveUpload and createRecording
 */
export async function acceptUpload(context: APIContext, actor: Actor): Promise<CreatedRecording> {
  try {
    const accepted = await takeUpload(context, actor);
    countUpload(accepted.created ? 'created' : 'repeated');
    return accepted;
  } catch (error) {
    countUpload('refused');
    throw error;
  }
}

async function takeUpload(context: APIContext, actor: Actor): Promise<CreatedRecording> {
  const { request } = context;
  const idempotencyKey = request.headers.get('idempotency-key');
  const byteCount = Number(request.headers.get('content-length') ?? 0);
  const key = keyBytes(idempotencyKey);
  const { upload, texts } = await receiveUpload(request, {
    storage: blobStorage(),
    beforeFile: async (early: FormTexts) => {
      const fields = parseUploadFields(early);
      // Fields may also follow the file; without a bench there is nothing to judge yet.
      const isPlaced = fields.benchId !== undefined || actor.memberships.length === 1;
      if (isPlaced) await placeUpload({ actor, fields, idempotencyKey: key, byteCount });
    },
  });
  try {
    const fields = parseUploadFields(texts);
    const benchId = benchToWriteIn(actor, fields.benchId, 'contribute');
    const present = await reloadActor(context);
    // The role may have gone, or the sign-in ended, while the file came in.
    if (present === null || !canInBench(present, benchId, 'contribute')) throw forbidden();
    return await createRecording({ actor: present, upload, fields: { ...fields, benchId }, idempotencyKey });
  } finally {
    await upload.temporary.discard();
  }
}
