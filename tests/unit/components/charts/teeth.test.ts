import { describe, expect, it } from 'vitest';
import { teethOver } from '#components/charts/teeth.ts';
import { createRandom } from '#lib/signal/synthesis/random.ts';
import { decibelsFromPower } from '#lib/units/decibels.ts';

/** One row a hertz, floor at 0 dB, lines of 20 dB where asked. */
function spectrum(linesHz: readonly number[]) {
  const positions = Array.from({ length: 2001 }, (_, hz) => hz);
  return { positions, levels: positions.map((hz) => (linesHz.includes(hz) ? 20 : 0)) };
}

describe('teethOver', () => {
  it('finds the lines at multiples of 287 Hz and misses the one that is absent', () => {
    const { positions, levels } = spectrum([287, 574, 1148, 1435]);
    const teeth = teethOver(positions, levels, 287);
    expect(teeth.map(({ multiple }) => multiple)).toEqual([1, 2, 3, 4, 5, 6]);
    expect(teeth.map(({ isFound }) => isFound)).toEqual([true, true, false, true, true, false]);
  });

  it('still finds a line 0.4 % beside the tenth tooth, for the speed moves while it is averaged', () => {
    const { positions, levels } = spectrum([1004]);
    expect(teethOver(positions, levels, 100)[9]?.isFound).toBe(true);
  });

  it('does not take a line 2 % beside for its own', () => {
    const { positions, levels } = spectrum([1020]);
    expect(teethOver(positions, levels, 100)[9]?.isFound).toBe(false);
  });

  it('has no teeth for a spacing beyond the spectrum', () => {
    const { positions, levels } = spectrum([]);
    expect(teethOver(positions, levels, 2500)).toEqual([]);
  });

  it('is not found in a gap', () => {
    const { positions } = spectrum([]);
    const [tooth] = teethOver(
      positions,
      positions.map(() => null),
      100,
    );
    expect(tooth).toMatchObject({ levelDecibels: null, isFound: false });
  });

  it('finds no line at more than 1 of 100 places of noise, which rises above its floor by chance', () => {
    const { uniform } = createRandom(20261201);
    const positions = Array.from({ length: 8001 }, (_, hz) => hz);
    // The power of noise in a row is exponentially distributed; its median is the floor.
    const levels = positions.map(() => decibelsFromPower(-Math.log(1 - uniform()) / Math.LN2));
    const teeth = teethOver(positions, levels, 40);
    expect(teeth).toHaveLength(200);
    expect(teeth.filter(({ isFound }) => isFound).length).toBeLessThanOrEqual(2);
  });
});
