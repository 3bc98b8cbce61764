import { describe, expect, it } from 'vitest';
import type { CombScores } from '#lib/signal/combScore.ts';
import { steadyPath, trackPath } from '#lib/signal/trackPath.ts';

const CELLS = 60;

/** Scores of 0 but for a ridge of the given height at one cell per frame; null leaves a frame empty. */
function ridge(cells: readonly (number | null)[], height: number): CombScores {
  const scores = new Float32Array(cells.length * CELLS);
  for (const [frame, cell] of cells.entries()) if (cell !== null) scores[frame * CELLS + cell] = height;
  return { frameCount: cells.length, firstCell: 500, cellCount: CELLS, scores };
}

describe('trackPath', () => {
  it('follows a ridge that climbs a cell a frame', () => {
    const cells = Array.from({ length: 40 }, (_, frame) => 10 + frame);
    expect([...trackPath(ridge(cells, 8), null).cells]).toEqual(cells.map((cell) => 500 + cell));
  });

  it('is silent where scores stay below what noise reaches', () => {
    const { cells, activeCount, meanScore } = trackPath(ridge(new Array<number>(40).fill(20), 2), null);
    expect(activeCount).toBe(0);
    expect(meanScore).toBe(0);
    expect(cells.every((cell) => cell === -1)).toBe(true);
  });

  it('marks a stop in the middle and finds the way back', () => {
    const cells = [
      ...new Array<number>(15).fill(20),
      ...new Array<null>(15).fill(null),
      ...new Array<number>(15).fill(20),
    ];
    const active = [...trackPath(ridge(cells, 8), null).cells].map((cell) => cell >= 0);
    expect(active).toEqual(cells.map((cell) => cell !== null));
  });

  it('does not leave its way for one loud frame elsewhere', () => {
    const combs = ridge(new Array<number>(30).fill(20), 6);
    combs.scores[15 * CELLS + 50] = 12;
    expect(trackPath(combs, null).cells[15]).toBe(520);
  });

  it('avoids masked cells', () => {
    const combs = ridge(new Array<number>(30).fill(20), 8);
    for (let frame = 0; frame < 30; frame++) combs.scores[frame * CELLS + 45] = 6;
    expect(trackPath(combs, (_, cell) => Math.abs(cell - 20) < 4).cells[10]).toBe(545);
  });
});

describe('steadyPath', () => {
  it('takes the cell with the highest mean though no frame alone stands out', () => {
    const combs = ridge(new Array<number>(30).fill(33), 1);
    const path = steadyPath(combs);
    expect(path.cells[0]).toBe(533);
    expect(path.meanScore).toBeCloseTo(1, 6);
  });
});
