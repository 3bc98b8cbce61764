import { describe, expect, it } from 'vitest';
import { cautionsFor, type CautionOccasion } from '#components/recording/upload/cautions.ts';

const bare = { poles: 2, segments: 3, blades: null, teeth: null, magnets: null };
const occasion = (changes: Partial<CautionOccasion> = {}): CautionOccasion => {
  return { geometry: bare, purpose: null, supplyVolts: '', currentAmps: '', ...changes };
};
const textOf = (changes: Partial<CautionOccasion>) => cautionsFor(occasion(changes)).join(' ');

describe('cautionsFor', () => {
  it('always begins with the motor and ends with the rules of the site', () => {
    const cautions = cautionsFor(occasion());
    expect(cautions).toHaveLength(2);
    expect(cautions[0]).toContain('Hold the motor down');
    expect(cautions[1]).toContain('rules of your site');
  });

  it.each([
    ['blades', { geometry: { ...bare, blades: 4 } }, 'Blades'],
    ['30 V', { supplyVolts: '30' }, 'At this voltage'],
    ['10 A with a comma', { currentAmps: '10,0' }, 'At this current'],
    ['stored charge', { purpose: 'run-time' }, 'lithium'],
    ['a class', { purpose: 'class' }, 'an adult'],
  ] as const)('adds one for %s', (_, changes, words) => {
    expect(textOf(changes)).toContain(words);
    expect(cautionsFor(occasion(changes))).toHaveLength(3);
  });

  it.each(['29.9', 'thirty', ''])('adds none for %j V', (supplyVolts) => {
    expect(textOf({ supplyVolts })).not.toContain('At this voltage');
  });

  it('never says that something is safe', () => {
    const everything = textOf({
      geometry: { ...bare, blades: 4 },
      purpose: 'class',
      supplyVolts: '48',
      currentAmps: '20',
    });
    expect(everything).not.toMatch(/\bsafe/i);
  });
});
