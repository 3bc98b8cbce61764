import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { firstIndexFrom, movedRange, wholeRange, zoomedRange } from '#components/charts/plotRange.ts';

const WHOLE = { from: 0, to: 100 };

describe('wholeRange', () => {
  it('spans the positions', () => {
    expect(wholeRange([1, 2, 5])).toEqual({ from: 1, to: 5 });
  });

  it('gives one position a width', () => {
    expect(wholeRange([3])).toEqual({ from: 2.5, to: 3.5 });
  });
});

describe('zoomedRange', () => {
  it('keeps the fixed place where it is', () => {
    expect(zoomedRange({ from: 20, to: 60 }, WHOLE, 0.5, 30)).toEqual({ from: 25, to: 45 });
  });

  it('never leaves the whole, whatever is asked', () => {
    const ratio = fc.double({ min: 0, max: 1, noNaN: true });
    const factor = fc.double({ min: 0.01, max: 100, noNaN: true });
    fc.assert(
      fc.property(ratio, ratio, factor, ratio, (start, width, zoom, about) => {
        const from = start * 90;
        const range = { from, to: from + 1 + width * (99 - from) };
        const zoomed = zoomedRange(range, WHOLE, zoom, range.from + about * (range.to - range.from));
        expect(zoomed.from).toBeGreaterThanOrEqual(0);
        expect(zoomed.to).toBeLessThanOrEqual(100);
        expect(zoomed.to).toBeGreaterThan(zoomed.from);
      }),
    );
  });
});

describe('movedRange', () => {
  it('stops at the end and keeps its width', () => {
    expect(movedRange({ from: 80, to: 90 }, WHOLE, 50)).toEqual({ from: 90, to: 100 });
  });
});

describe('firstIndexFrom', () => {
  it('finds the first position at or after a value, as a plain search does', () => {
    fc.assert(
      fc.property(fc.array(fc.integer({ min: 0, max: 50 })), fc.integer({ min: -5, max: 55 }), (values, wanted) => {
        const positions = values.toSorted((a, b) => a - b);
        const plain = positions.findIndex((position) => position >= wanted);
        expect(firstIndexFrom(positions, wanted)).toBe(plain < 0 ? positions.length : plain);
      }),
    );
  });
});
