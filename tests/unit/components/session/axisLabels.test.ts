import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { anchorAt, labelExtent, ticksWithRoom } from '#components/session/axisLabels.ts';
import { speedAxis } from '#components/session/speedAxis.ts';

function axisOf(lowRpm: number, highRpm: number) {
  const axis = speedAxis([{ rpm: lowRpm, rpmLow: lowRpm, rpmHigh: highRpm }]);
  if (axis === null) throw new Error('no axis');
  return axis;
}

describe('anchorAt', () => {
  it.each([
    [0, 'start'],
    [50, 'middle'],
    [100, 'end'],
  ])('at %i per cent is the %s', (percent, anchor) => {
    expect(anchorAt(percent)).toBe(anchor);
  });
});

describe('labelExtent', () => {
  it('of 10 000 rpm in the middle reaches half its 5 digits and its gap to both sides', () => {
    const axis = { minimumRpm: 0, maximumRpm: 20_000, isLogarithmic: false, ticksRpm: [0, 10_000, 20_000] };
    expect(labelExtent(axis, 10_000, { digitPercent: 3, gapPercent: 3 })).toEqual({ from: 41, to: 59 });
    expect(labelExtent(axis, 20_000, { digitPercent: 3, gapPercent: 3 })).toEqual({ from: 82, to: 100 });
  });
});

describe('ticksWithRoom', () => {
  it('leaves 10 000 out beside 20 000 rpm when five digits take 18 per cent', () => {
    const width = { digitPercent: 3, gapPercent: 3 };
    expect(ticksWithRoom(axisOf(1199, 10_035), width)).toEqual([1000, 2000, 5000, 20_000]);
  });

  it('keeps all five ticks when five digits take 11 per cent', () => {
    const width = { digitPercent: 1.8, gapPercent: 1.8 };
    expect(ticksWithRoom(axisOf(1199, 10_035), width)).toEqual([1000, 2000, 5000, 10_000, 20_000]);
  });

  it('keeps both ends, and no two labels touch, whatever the speeds', () => {
    const rpm = fc.double({ min: 60, max: 60_000, noNaN: true });
    const width = { digitPercent: 3.7, gapPercent: 3.5 };
    fc.assert(
      fc.property(rpm, rpm, (one, other) => {
        // Whole speeds as on a page: a tick with many digits behind the mark has no room anywhere.
        const axis = axisOf(Math.floor(Math.min(one, other)), Math.ceil(Math.max(one, other)) + 10);
        const kept = ticksWithRoom(axis, width);
        expect(kept[0]).toBe(axis.ticksRpm[0]);
        expect(kept.at(-1)).toBe(axis.ticksRpm.at(-1));
        const ends = kept.map((tick) => labelExtent(axis, tick, width));
        for (const [index, { from }] of ends.slice(1).entries()) {
          expect(from).toBeGreaterThanOrEqual(ends[index]?.to ?? Infinity);
        }
      }),
      { seed: 20261201 },
    );
  });
});
