import { Readable } from 'node:stream';
import type { ReadableStream } from 'node:stream/web';
import multer from 'multer';
import { MAXIMUM_UPLOAD_BYTES } from '#lib/schemas/uploadLimits.ts';
import { invalidFields, type ServerError } from '#server/errors.ts';
import { requireFreeSpace } from '#server/usecases/requireFreeSpace.ts';
import type { BlobStorage } from '#server/storage/storage.ts';
import type { ReceivedUpload } from '#server/usecases/receivedUpload.ts';
import { linger } from './linger.ts';
import type { FormTexts } from './upload/parseUploadFields.ts';
import { PartHeaderFilter } from './upload/partHeaderFilter.ts';
import { UploadEngine } from './upload/UploadEngine.ts';
import { malformedForm, notMultipart, tooLarge, uploadRefusal } from './upload/uploadRefusals.ts';

const FIELD_MAXIMUM_BYTES = 64 * 1024;
const FIELD_MAXIMUM_COUNT = 24;
const FIELD_NAME_MAXIMUM_BYTES = 100;
/** Room for the text fields and part headers around a file of the largest size. */
const FORM_MAXIMUM_BYTES = MAXIMUM_UPLOAD_BYTES + FIELD_MAXIMUM_COUNT * FIELD_MAXIMUM_BYTES;

interface ReceiveUploadOptions {
  readonly storage: BlobStorage;
  /** Runs with the fields that came before the file, so that a refusal need not wait for the file. */
  readonly beforeFile: (texts: FormTexts) => Promise<void>;
}

export interface ReceivedForm {
  readonly upload: ReceivedUpload;
  readonly texts: FormTexts;
}

/**
 * Reads a multipart form with exactly one `file`, which streams to temporary storage: whatever its size, a few
 * blocks of it are in memory. Headers are judged before the body is read.
 *
 * @returns the file, which the caller commits or discards, and the text fields
 * @throws ServerError too-large, storage-full, storage-unavailable, unsupported-media-type, bad-request,
 *   invalid-fields, or what `beforeFile` throws; then nothing is left behind
 */
export async function receiveUpload(request: Request, options: ReceiveUploadOptions): Promise<ReceivedForm> {
  const { body, boundary } = requireMultipart(request);
  const declaredBytes = requireFittingLength(request);
  await requireFreeSpace(options.storage, declaredBytes);

  const source = Readable.fromWeb(body as ReadableStream);
  const form = new FormReader(source, boundary, options);
  try {
    const texts = await form.read(request.headers.get('content-type') ?? '');
    const upload = await form.engine.received();
    if (upload === null) throw invalidFields([{ field: 'file', message: 'Choose a file to upload.' }]);
    return { upload, texts };
  } catch (error) {
    await form.engine.discard();
    linger(source);
    throw uploadRefusal(error);
  }
}

/** The stream that multer takes for the request. */
type MulterBody = PartHeaderFilter & { headers: Record<string, string>; body?: FormTexts };
type Middleware = (body: MulterBody, response: null, next: (error?: unknown) => void) => void;

class FormReader {
  readonly engine: UploadEngine;
  readonly #source: Readable;
  readonly #filter: PartHeaderFilter;
  readonly #beforeFile: ReceiveUploadOptions['beforeFile'];
  #receivedBytes = 0;
  #failure: ServerError | null = null;

  constructor(source: Readable, boundary: string, { storage, beforeFile }: ReceiveUploadOptions) {
    this.#source = source;
    this.#filter = new PartHeaderFilter(boundary);
    this.#beforeFile = beforeFile;
    this.engine = new UploadEngine(storage, this.#fail);
  }

  read(contentType: string): Promise<FormTexts> {
    // multer asks whether there is a body by these headers; the real ones were judged before.
    const headers = { 'content-type': contentType, 'transfer-encoding': 'chunked' };
    const body: MulterBody = Object.assign(this.#filter, { headers });
    // Not `pipeline`: it would end the connection with the parser, before the refusal is sent.
    this.#source.on('error', this.#fail).on('data', this.#count).pipe(this.#filter);
    return new Promise((resolve, reject) => {
      this.#middleware()(body, null, (error) => {
        if (error === undefined) resolve(body.body ?? {});
        else reject(this.#failure ?? (error as Error));
      });
    });
  }

  #middleware(): Middleware {
    const parser = multer({
      storage: this.engine,
      preservePath: true,
      defParamCharset: 'utf8',
      limits: {
        fieldNameSize: FIELD_NAME_MAXIMUM_BYTES,
        fieldSize: FIELD_MAXIMUM_BYTES,
        fields: FIELD_MAXIMUM_COUNT,
        parts: FIELD_MAXIMUM_COUNT + 1,
        fieldArrayIndexLimit: FIELD_MAXIMUM_COUNT,
      },
      fileFilter: (request, _file, decide) => {
        this.#beforeFile(request.body as FormTexts).then(() => {
          decide(null, true);
        }, this.#fail);
      },
    });
    // multer's types want Express; its code wants a readable stream with headers.
    return parser.single('file') as unknown as Middleware;
  }

  readonly #count = (chunk: Buffer): void => {
    this.#receivedBytes += chunk.length;
    if (this.#receivedBytes > FORM_MAXIMUM_BYTES) this.#fail(tooLarge());
  };

  /** Ends the parser at once; it would otherwise read the rest of the body before it says what is wrong. */
  readonly #fail = (error: unknown): void => {
    // What follows from the first failure is not the reason.
    this.#failure ??= uploadRefusal(error);
    this.#source.unpipe(this.#filter);
    this.#filter.destroy(this.#failure);
  };
}

function requireMultipart(request: Request): { body: NonNullable<Request['body']>; boundary: string } {
  const contentType = request.headers.get('content-type') ?? '';
  if (!/^multipart\/form-data\b/i.test(contentType)) throw notMultipart();
  if ((request.headers.get('content-encoding') ?? 'identity') !== 'identity') throw notMultipart();
  const [, quoted, plain] = /;\s*boundary=(?:"([^"]{1,70})"|([^\s;"]{1,70}))/i.exec(contentType) ?? [];
  const boundary = quoted ?? plain;
  if (boundary === undefined || request.body === null) throw malformedForm();
  return { body: request.body, boundary };
}

/** @returns the declared length, 0 when it is not declared */
function requireFittingLength(request: Request): number {
  const declaredBytes = Number(request.headers.get('content-length') ?? 0);
  if (!(declaredBytes <= FORM_MAXIMUM_BYTES)) throw tooLarge();
  return declaredBytes;
}
