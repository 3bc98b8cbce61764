import { open } from 'node:fs/promises';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { isUnfinishedMp4 } from '#server/media/isUnfinishedMp4.ts';
import { createMediaFolder, type MediaFolder } from '#tests/fixtures/media/makeMedia.ts';

let folder: MediaFolder;
beforeAll(async () => {
  folder = await createMediaFolder();
});
afterAll(() => folder.remove());

/** A box; the size that it claims is its own unless given. */
function box(type: string, body: Buffer, claimedBytes = body.length + 8): Buffer {
  const header = Buffer.alloc(8);
  header.writeUInt32BE(claimedBytes, 0);
  header.write(type, 4, 'latin1');
  return Buffer.concat([header, body]);
}

const fileType = box('ftyp', Buffer.from('M4A \0\0\0\0', 'latin1'));
const body = Buffer.alloc(100, 1);
const sizeBehindType = Buffer.from('000000000000006c', 'hex');

describe('isUnfinishedMp4', () => {
  it.each([
    ['media, then the index', [fileType, box('mdat', body), box('moov', body)], false],
    ['the index, then media that is cut off', [fileType, box('moov', body), box('mdat', body, 5000)], false],
    [
      'media with a 64-bit size, then the index',
      [box('mdat', Buffer.concat([sizeBehindType, body.subarray(8)]), 1), box('moov', body)],
      false,
    ],
    ['media that is cut off', [fileType, box('mdat', body, 5000)], true],
    ['media of open size', [fileType, box('mdat', body, 0)], true],
    ['media without an index', [fileType, box('mdat', body)], true],
    ['an index that is cut off', [fileType, box('mdat', body), box('moov', body, 5000)], true],
    ['garbage behind the media', [fileType, box('mdat', body), Buffer.alloc(50)], true],
    ['no media at all', [fileType, box('free', body)], false],
  ])('%s', async (_layout, boxes, expected) => {
    const path = await folder.write('a.mp4', Buffer.concat(boxes));
    const file = await open(path, 'r');
    const isUnfinished = await isUnfinishedMp4(file, (await file.stat()).size);
    await file.close();
    expect(isUnfinished).toBe(expected);
  });
});
