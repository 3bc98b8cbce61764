import type { Transaction } from 'sequelize';
import type { UploadFields } from '#lib/schemas/recording.ts';
import { invalidFields, ServerError } from '../errors.ts';
import { Build } from '../models/Build.ts';
import { Recording } from '../models/Recording.ts';
import { Session } from '../models/Session.ts';
import type { Actor } from '../policies/actor.ts';
import { benchToWriteIn } from './benchChoice.ts';
import { requireRoomInBench } from './requireRoomInBench.ts';

interface PlaceUploadOptions {
  readonly actor: Actor;
  readonly fields: UploadFields;
  readonly idempotencyKey: Buffer | null;
  /** What is known of the size before or after the file has come in. */
  readonly byteCount: number;
}

/** Where an upload belongs. */
export interface UploadPlace {
  readonly benchId: string;
  readonly sessionId: string | null;
  readonly buildId: string | null;
  readonly buildRevision: number | null;
  /** The recording that was made before with the same idempotency key. */
  readonly earlier: Recording | null;
}

/**
 * Everything about an upload that can be judged without its bytes. It runs before the file is read, and again when
 * the file is there.
 *
 * @throws ServerError invalid-fields, not-found, forbidden, too-many-waiting, storage-full
 */
export async function placeUpload(options: PlaceUploadOptions): Promise<UploadPlace> {
  const { actor, fields, idempotencyKey } = options;
  const benchId = benchToWriteIn(actor, fields.benchId, 'contribute');
  const { session, build } = await loadMotor(benchId, fields);
  const earlier = idempotencyKey && (await Recording.loadByIdempotencyKey({ benchId, idempotencyKey }));
  // A repeated upload was let in before; it takes no room now.
  if (earlier === null) await requireRoomInBench(benchId, options.byteCount);
  return {
    benchId,
    sessionId: session?.id ?? null,
    buildId: build?.id ?? null,
    buildRevision: build?.revision ?? null,
    earlier,
  };
}

/** The session and build that are named; without a named build, the build that the session is about. */
export async function loadMotor(
  benchId: string,
  fields: { readonly sessionId?: string | null | undefined; readonly buildId?: string | null | undefined },
  transaction: Transaction | null = null,
): Promise<{ session: Session | null; build: Build | null }> {
  const { sessionId } = fields;
  const session = sessionId ? await Session.findOne({ where: { benchId, id: sessionId }, transaction }) : null;
  if (sessionId && session === null) throw notOfThisBench('sessionId', 'session');
  const buildId = fields.buildId ?? session?.buildId;
  const build = buildId ? await Build.findOne({ where: { benchId, id: buildId }, transaction }) : null;
  if (buildId && build === null) throw notOfThisBench('buildId', 'build');
  return { session, build };
}

/** Says the same whether the record is another bench's or nobody's. */
function notOfThisBench(field: string, what: string): ServerError {
  return invalidFields([{ field, message: `There is no such ${what} in this bench.` }]);
}
