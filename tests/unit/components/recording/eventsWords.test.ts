import { describe, expect, it } from 'vitest';
import { eventsSentence, wrongCountTexts } from '#components/recording/eventsWords.ts';

const NOTHING = { poles: null, segments: null, blades: null, teeth: null, magnets: null };
const THREE_SEGMENTS = { ...NOTHING, poles: 2, segments: 3 };

describe('eventsSentence', () => {
  it('explains 6 ripples by 3 segments and 2 poles', () => {
    expect(eventsSentence(6, THREE_SEGMENTS)).toBe('Six ripples a turn: 3 segments × 2 poles.');
  });

  it('does not write a product where 8 segments under 2 poles ripple 8 times', () => {
    expect(eventsSentence(8, { ...NOTHING, poles: 2, segments: 8 })).toBe(
      'Eight ripples a turn: 8 segments under 2 poles.',
    );
  });

  it('counts the blades of a fan', () => {
    expect(eventsSentence(7, { ...NOTHING, blades: 7 })).toBe('Seven blades a turn, each passing once.');
  });

  it('says that 0.5 events were given', () => {
    expect(eventsSentence(0.5, null)).toBe('0.5 events a turn, as given.');
  });

  it('has one event a turn in the singular', () => {
    expect(eventsSentence(1, null)).toBe('One event a turn, as given.');
  });
});

describe('wrongCountTexts', () => {
  // lcm(2, 5) = 10 and lcm(2, 7) = 14: Microchip AN3049 (2019), ripples per turn.
  it('says what 5 and 7 segments would make of 2874 rpm with 6 a turn', () => {
    expect(wrongCountTexts({ rpm: 2874, eventsPerTurn: 6 }, THREE_SEGMENTS)).toEqual([
      '10 a turn: 1724 rpm',
      '14 a turn: 1232 rpm',
    ]);
  });

  it('takes one blade less and one more where there is no commutator', () => {
    expect(wrongCountTexts({ rpm: 1000, eventsPerTurn: 4 }, { ...NOTHING, blades: 4 })).toEqual([
      '5 a turn: 800 rpm',
      '3 a turn: 1333 rpm',
    ]);
  });
});
