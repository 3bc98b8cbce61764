import { describe, expect, it } from 'vitest';
import { proofReasons } from '#components/recording/proofReasons.ts';

/** One row a hertz with lines of 20 dB, the first of 30 dB. */
function spectrum(linesHz: readonly number[]) {
  const positions = Array.from({ length: 3001 }, (_, hz) => hz);
  const levels = positions.map((hz) => (hz === linesHz[0] ? 30 : linesHz.includes(hz) ? 20 : 0));
  return { positions, levels };
}

function reasonsFor(linesHz: readonly number[], spacing: number) {
  const { positions, levels } = spectrum(linesHz);
  return proofReasons(positions, levels, { spacing, unit: 'Hz' });
}

describe('proofReasons', () => {
  it('counts the teeth on a line and points at them', () => {
    const [first] = reasonsFor([300, 600, 900, 1500], 300);
    expect(first).toEqual({ text: '4 of the first 8 teeth stand on a line.', teeth: [1, 2, 3, 5] });
  });

  it('names the strongest line and the missing teeth', () => {
    const texts = reasonsFor([300, 600, 900, 1200, 1500, 1800], 300).map(({ text }) => text);
    expect(texts).toContain('The strongest line under a tooth is at 300.0 Hz, 30 dB above the floor.');
    expect(texts).toContain('No line at teeth 7 and 8.');
  });

  it('speaks against half the speed when nothing lies between the teeth', () => {
    const last = reasonsFor([300, 600, 900], 300).at(-1);
    expect(last?.text).toBe('Between the teeth, where half the speed would need lines, 0 of 8 places have one.');
  });

  it('says that half stays possible when lines lie between the teeth', () => {
    const lines = Array.from({ length: 18 }, (_, index) => (index + 1) * 150);
    expect(reasonsFor(lines, 300).at(-1)?.text).toContain('half stays possible');
  });

  it('says so when even the first tooth is beyond the spectrum', () => {
    expect(reasonsFor([300], 5000)).toEqual([{ text: 'The first tooth lies beyond this spectrum.', teeth: [] }]);
  });
});
