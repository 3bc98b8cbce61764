import { describe, expect, it } from 'vitest';
import { cellOfHertz, cellShift, hertzOfCell } from '#lib/signal/logGrid.ts';

describe('cellOfHertz', () => {
  it('is undone by hertzOfCell within half a cell of 0.58 %', () => {
    for (const hertz of [0.25, 1, 33.3, 440, 5200, 13_999]) {
      expect(Math.abs(hertzOfCell(cellOfHertz(hertz)) / hertz - 1)).toBeLessThan(0.0029);
    }
  });
});

describe('cellShift', () => {
  it('moves an octave by 120 cells and a fifth (3/2) by 70', () => {
    expect(cellShift(2)).toBe(120);
    expect(cellShift(1.5)).toBe(70);
    expect(cellShift(1 / 2)).toBe(-120);
  });
});
