import { once } from 'node:events';
import { type ClientRequest, type IncomingMessage, request } from 'node:http';
import { uploadResponse, recordingView, type RecordingView, type UploadResponse } from '#lib/schemas/recording.ts';
import { type ApiAnswer, apiClient, baseUrl } from './apiClient.ts';

/** Uploads as browsers and scripts send them, and as nobody should. */

export const RECORDINGS = '/api/v1/recordings';
export const BOUNDARY = 'ripplebench-test-boundary';

interface Holder {
  readonly token: string;
}

export interface UploadOptions {
  readonly bytes: Uint8Array<ArrayBuffer>;
  readonly fileName?: string;
  readonly fields?: Readonly<Record<string, string>>;
  readonly key?: string;
}

/** One well-formed upload. */
export function sendUpload(holder: Holder, { bytes, fileName = 'run.wav', fields = {}, key }: UploadOptions) {
  const body = new FormData();
  for (const [name, value] of Object.entries(fields)) body.append(name, value);
  body.append('file', new Blob([bytes], { type: 'audio/wav' }), fileName);
  const headers = key === undefined ? {} : { 'idempotency-key': key };
  return apiClient(holder).send(RECORDINGS, { method: 'POST', body, headers });
}

export type Uploaded = UploadResponse['recordings'][number];

/** @returns what an upload that must be accepted was told */
export async function upload(holder: Holder, options: UploadOptions): Promise<Uploaded> {
  const answer = await sendUpload(holder, options);
  if (answer.status !== 201) throw new Error(`The upload was answered ${String(answer.status)}: ${answer.text}`);
  const [recording] = uploadResponse.parse(answer.body).recordings;
  if (recording === undefined) throw new Error('The upload was answered without a recording.');
  return recording;
}

export async function getRecordingView(holder: Holder, id: string): Promise<RecordingView> {
  const answer = await apiClient(holder).get(`${RECORDINGS}/${id}`);
  if (answer.status !== 200) throw new Error(`GET was answered ${String(answer.status)}: ${answer.text}`);
  return recordingView.parse(answer.body);
}

/** Polls until the worker is done with a recording. */
export async function untilAnalysed(holder: Holder, id: string): Promise<RecordingView> {
  const end = performance.now() + 30_000;
  while (performance.now() < end) {
    const view = await getRecordingView(holder, id);
    if (view.status === 'done' || view.status === 'failed') return view;
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
  throw new Error(`Recording ${id} was not analysed within 30 s.`);
}

/** One part of a form, byte for byte as given. `disposition` is what follows `form-data`. */
export function part(disposition: string, content: string | Uint8Array, contentType?: string): Buffer {
  const type = contentType === undefined ? '' : `Content-Type: ${contentType}\r\n`;
  const header = `--${BOUNDARY}\r\nContent-Disposition: form-data${disposition}\r\n${type}\r\n`;
  return Buffer.concat([Buffer.from(header), Buffer.from(content), Buffer.from('\r\n')]);
}

export const field = (name: string, value: string): Buffer => part(`; name="${name}"`, value);
export const filePart = (bytes: Uint8Array, fileName = 'run.wav'): Buffer =>
  part(`; name="file"; filename="${fileName}"`, bytes, 'audio/wav');
export const FORM_END: Buffer = Buffer.from(`--${BOUNDARY}--\r\n`);

interface RawUpload {
  readonly body?: Uint8Array;
  readonly headers?: Readonly<Record<string, string | number>>;
}

/** A request whose every byte the test decides; the answer may come before the body has left. */
export function openUpload(holder: Holder, headers: RawUpload['headers'] = {}, site = baseUrl()): ClientRequest {
  const url = new URL(RECORDINGS, site);
  const all = {
    authorization: `Bearer ${holder.token}`,
    'content-type': `multipart/form-data; boundary=${BOUNDARY}`,
    ...headers,
  };
  return request(url, { method: 'POST', headers: all, agent: false });
}

export async function answerTo(sent: ClientRequest): Promise<ApiAnswer> {
  const [response] = (await once(sent, 'response')) as [IncomingMessage];
  const chunks: Buffer[] = [];
  for await (const chunk of response) chunks.push(chunk as Buffer);
  const text = Buffer.concat(chunks).toString();
  const headers = new Headers();
  for (const [name, value] of Object.entries(response.headers)) headers.set(name, String(value));
  return { status: response.statusCode ?? 0, headers, text, body: text === '' ? null : JSON.parse(text) };
}

export function sendRaw(
  holder: Holder,
  { body = Buffer.alloc(0), headers }: RawUpload,
  site?: string,
): Promise<ApiAnswer> {
  const sent = openUpload(holder, { 'content-length': body.length, ...headers }, site);
  const answer = answerTo(sent);
  sent.end(body);
  return answer;
}
