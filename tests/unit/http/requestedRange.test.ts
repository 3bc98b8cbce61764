import { describe, expect, it } from 'vitest';
import { requestedRange } from '#http/blobResponse.ts';

// RFC 9110 section 14.1.2 gives the first five for a representation of 10,000 bytes.
describe('requestedRange', () => {
  it.each([
    ['bytes=0-499', { firstByte: 0, lastByte: 499 }],
    ['bytes=500-999', { firstByte: 500, lastByte: 999 }],
    ['bytes=-500', { firstByte: 9500, lastByte: 9999 }],
    ['bytes=9500-', { firstByte: 9500, lastByte: 9999 }],
    ['bytes=0-0', { firstByte: 0, lastByte: 0 }],
    ['bytes=9999-20000', { firstByte: 9999, lastByte: 9999 }],
    ['bytes=-20000', { firstByte: 0, lastByte: 9999 }],
    ['bytes=10000-', 'unsatisfiable'],
    ['bytes=-0', 'unsatisfiable'],
    ['bytes=5-2', null],
    ['bytes=0-0,-1', null],
    ['bytes=-', null],
    ['items=0-1', null],
    [null, null],
  ] as const)('reads %s of 10,000 bytes', (header, range) => {
    expect(requestedRange(header, 10_000)).toEqual(range);
  });
});
