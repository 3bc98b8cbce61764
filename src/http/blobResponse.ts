import type { ServerResponse } from 'node:http';
import { Readable } from 'node:stream';
import type { APIContext } from 'astro';
import type { ByteRange, ReadableBlob } from '#server/storage/storage.ts';

interface BlobResponseOptions {
  readonly blob: ReadableBlob;
  readonly contentType: string;
  /** Names the bytes; they never change. */
  readonly sha256: Buffer;
  readonly headers?: Readonly<Record<string, string>>;
}

/**
 * Bytes from storage, whole or the range that was asked for. No more of them are read than the client takes.
 */
export function blobResponse(context: Pick<APIContext, 'request' | 'locals'>, options: BlobResponseOptions): Response {
  const { blob, contentType, sha256 } = options;
  const { byteCount } = blob;
  const headers = new Headers({
    ...options.headers,
    'content-type': contentType,
    'accept-ranges': 'bytes',
    etag: `"${sha256.toString('hex')}"`,
  });
  const range = requestedRange(context.request.headers.get('range'), byteCount);
  if (range === 'unsatisfiable') {
    headers.set('content-range', `bytes */${String(byteCount)}`);
    return new Response(null, { status: 416, headers });
  }
  const sentBytes = range === null ? byteCount : range.lastByte - range.firstByte + 1;
  headers.set('content-length', String(sentBytes));
  if (range !== null) {
    headers.set('content-range', `bytes ${String(range.firstByte)}-${String(range.lastByte)}/${String(byteCount)}`);
  }
  const body = context.request.method === 'HEAD' ? null : webStream(blob, range, context.locals.nodeResponse);
  return new Response(body, { status: range === null ? 200 : 206, headers });
}

/**
 * The one range of RFC 9110 section 14 that players send; several at once and other units are answered whole.
 */
export function requestedRange(header: string | null, byteCount: number): ByteRange | 'unsatisfiable' | null {
  const [, first = '', last = ''] = /^bytes=(\d*)-(\d*)$/.exec(header ?? '') ?? [];
  if (first === '' && last === '') return null;
  const lastOfAll = byteCount - 1;
  if (first === '') {
    const suffixBytes = Number(last);
    return suffixBytes === 0
      ? 'unsatisfiable'
      : { firstByte: Math.max(0, byteCount - suffixBytes), lastByte: lastOfAll };
  }
  const firstByte = Number(first);
  const lastByte = last === '' ? lastOfAll : Math.min(Number(last), lastOfAll);
  if (firstByte > lastOfAll) return 'unsatisfiable';
  return lastByte < firstByte ? null : { firstByte, lastByte };
}

function webStream(blob: ReadableBlob, range: ByteRange | null, response: ServerResponse | undefined): ReadableStream {
  const blocks = Readable.from(pacedBlocks(blob, range, response), { highWaterMark: 1 });
  return Readable.toWeb(blocks) as ReadableStream;
}

/** Astro writes what a stream yields without looking back; waiting here keeps the next block on the disk. */
async function* pacedBlocks(blob: ReadableBlob, range: ByteRange | null, response: ServerResponse | undefined) {
  for await (const block of blob.read(range ?? undefined)) {
    yield block as Buffer;
    if (response?.writableNeedDrain === true) await drained(response);
  }
}

function drained(response: ServerResponse): Promise<void> {
  return new Promise((resolve) => {
    const settle = () => {
      response.off('drain', settle).off('close', settle);
      resolve();
    };
    response.on('drain', settle).on('close', settle);
    if (response.destroyed) settle();
  });
}
