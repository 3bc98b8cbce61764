import { uploadResponse, type UploadFields, type UploadResponse } from '#lib/schemas/recording.ts';
import { errorFromAnswer, unreachableError } from './ApiError.ts';
import { API_BASE_PATH, parseAnswer } from './request.ts';

export interface UploadProgress {
  readonly sentBytes: number;
  /** Size of the whole request, which is a little more than the file's. */
  readonly totalBytes: number;
}

export interface UploadOptions {
  readonly file: File;
  readonly fields: UploadFields;
  /** The same key with the same file is the same recording, however often it is sent. */
  readonly idempotencyKey: string;
  readonly signal: AbortSignal;
  readonly onProgress: (progress: UploadProgress) => void;
}

export type UploadedRecording = UploadResponse['recordings'][number];

/**
 * Sends one file. XMLHttpRequest, because fetch cannot tell how many bytes have left.
 *
 * @throws {ApiError} on a refusal or when the connection breaks
 * @throws {DOMException} AbortError when `signal` ends it
 */
export async function uploadRecording(options: UploadOptions): Promise<UploadedRecording> {
  const { status, bodyText } = await post(options);
  if (status < 200 || status >= 300) throw errorFromAnswer(status, bodyText);
  const [recording] = parseAnswer(uploadResponse, status, bodyText).recordings;
  if (!recording) throw errorFromAnswer(status, bodyText);
  return recording;
}

function post({ file, fields, idempotencyKey, signal, onProgress }: UploadOptions) {
  return new Promise<{ status: number; bodyText: string }>((resolve, reject) => {
    signal.throwIfAborted();
    const http = new XMLHttpRequest();
    const abort = () => {
      http.abort();
    };
    signal.addEventListener('abort', abort, { once: true });
    http.upload.onprogress = ({ loaded, total }) => {
      onProgress({ sentBytes: loaded, totalBytes: total });
    };
    http.onload = () => {
      resolve({ status: http.status, bodyText: http.responseText });
    };
    http.onerror = () => {
      reject(unreachableError());
    };
    http.onabort = () => {
      reject(new DOMException('The upload was cancelled.', 'AbortError'));
    };
    http.onloadend = () => {
      signal.removeEventListener('abort', abort);
    };
    http.open('POST', `${API_BASE_PATH}/recordings`);
    http.setRequestHeader('Accept', 'application/json');
    http.setRequestHeader('Idempotency-Key', idempotencyKey);
    http.send(multipartBody(file, fields));
  });
}

/** Fields come before the file, so that the server can refuse them before it has read the file. */
function multipartBody(file: File, fields: UploadFields): FormData {
  const body = new FormData();
  for (const [name, value] of Object.entries(fields)) {
    if (value !== undefined) body.append(name, String(value));
  }
  body.append('file', file, file.name);
  return body;
}
