import type { StorageEngine } from 'multer';
import { shownFileName } from '#lib/schemas/fileName.ts';
import { MAXIMUM_UPLOAD_BYTES } from '#lib/schemas/uploadLimits.ts';
import { invalidFields } from '#server/errors.ts';
import type { BlobStorage, TemporaryBlob } from '#server/storage/storage.ts';
import { writeHashed } from '#server/storage/writeHashed.ts';
import type { ReceivedUpload } from '#server/usecases/receivedUpload.ts';
import { tooLarge } from './uploadRefusals.ts';

type MulterFile = Parameters<StorageEngine['_handleFile']>[1];
type Stored = Parameters<StorageEngine['_handleFile']>[2];

/** Where multer puts the one file of one upload: straight into storage, hashed and counted on the way. */
export class UploadEngine implements StorageEngine {
  readonly #storage: BlobStorage;
  readonly #onFailure: (error: unknown) => void;
  #storing: Promise<ReceivedUpload> | null = null;

  /** @param onFailure hears of a failure at once; multer itself would read the rest of the body first */
  constructor(storage: BlobStorage, onFailure: (error: unknown) => void) {
    this.#storage = storage;
    this.#onFailure = onFailure;
  }

  _handleFile(_request: unknown, file: MulterFile, stored: Stored): void {
    this.#storing = this.#store(file);
    this.#storing.then(
      () => {
        stored(null, {});
      },
      (error: unknown) => {
        this.#onFailure(error);
        stored(error);
      },
    );
  }

  _removeFile(_request: unknown, _file: MulterFile, removed: (error: Error | null) => void): void {
    void this.discard().then(() => {
      removed(null);
    });
  }

  /** @returns null when the form had no file */
  async received(): Promise<ReceivedUpload | null> {
    return this.#storing;
  }

  /** Forgets whatever was stored, also what is still on its way. */
  async discard(): Promise<void> {
    const received = await this.#storing?.catch(() => null);
    await received?.temporary.discard();
  }

  async #store(file: MulterFile): Promise<ReceivedUpload> {
    if (file.originalname.includes('\0')) {
      throw invalidFields([{ field: 'file', message: 'The file name must not contain a NUL character.' }]);
    }
    const temporary = await this.#storage.createTemporary();
    return { temporary, fileName: shownFileName(file.originalname), ...(await this.#fill(temporary, file)) };
  }

  async #fill(temporary: TemporaryBlob, file: MulterFile) {
    try {
      return await writeHashed({
        source: file.stream,
        target: temporary,
        maximumBytes: MAXIMUM_UPLOAD_BYTES,
        tooLarge,
      });
    } catch (error) {
      this.#onFailure(error);
      await temporary.discard();
      throw error;
    }
  }
}
