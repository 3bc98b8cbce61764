import { describe, expect, it } from 'vitest';
import { proofReasons } from '#components/recording/proofReasons.ts';

/** One row a hertz with lines of 20 dB, the first of 30 dB. */
function spectrum(linesHz: readonly number[]) {
  const positions = Array.from({ length: 3001 }, (_, hz) => hz);
  const levels = positions.map((hz) => (hz === linesHz[0] ? 30 : linesHz.includes(hz) ? 20 : 0));
  return { positions, levels };
}

function reasonsFor(linesHz: readonly number[], spacing: number, ranking = {}) {
  const { positions, levels } = spectrum(linesHz);
  return proofReasons(positions, levels, {
    spacing,
    unit: 'Hz',
    eventsPerTurn: 6,
    isHalfPossible: false,
    ...ranking,
  });
}

describe('proofReasons', () => {
  it('counts the teeth on a line and points at them', () => {
    const [first] = reasonsFor([300, 600, 900, 1500], 300);
    expect(first).toEqual({
      text: '4 of the first 8 teeth stand on a line.',
      teeth: [1, 2, 3, 5],
    });
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

  describe('with a line at all 8 places between the teeth', () => {
    const lines = Array.from({ length: 18 }, (_, index) => (index + 1) * 150);
    const lastText = (ranking: object) => reasonsFor(lines, 300, ranking).at(-1)?.text;

    it('says that half stays possible when the ranking says so', () => {
      expect(lastText({ isHalfPossible: true })).toMatch(/8 of 8 places have one: half stays possible\.$/u);
    });

    it('says what else puts them there when the ranking speaks against half and 6 events make a turn', () => {
      expect(lastText({ eventsPerTurn: 6 })).toMatch(/8 of 8 places have one\. Events that differ within a turn/u);
    });

    it('blames no uneven turn for them when 5 events make one: 2.5 is no order of the shaft', () => {
      expect(lastText({ eventsPerTurn: 5 })).toMatch(/have one, yet half explains the other lines less well\.$/u);
    });
  });

  it('says so when even the first tooth is beyond the spectrum', () => {
    expect(reasonsFor([300], 5000)).toEqual([{ text: 'The first tooth lies beyond this spectrum.', teeth: [] }]);
  });
});
