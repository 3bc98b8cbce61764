import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { digitGroups, groupedParts, thinSpaced } from '#components/ui/digitGroups.ts';

const flat = (text: string) =>
  groupedParts(text)
    .map((part) => (typeof part === 'string' ? part : part.join('')))
    .join('');

describe('digitGroups', () => {
  it('groups by three from the right (ISO 80000-1, 7.3.1)', () => {
    expect(digitGroups('1234567')).toEqual(['1', '234', '567']);
  });

  it('leaves three digits alone', () => {
    expect(digitGroups('874')).toEqual(['874']);
  });

  it('loses no digit', () => {
    fc.assert(
      fc.property(fc.nat(), (value) => {
        expect(digitGroups(String(value)).join('')).toBe(String(value));
      }),
    );
  });
});

describe('groupedParts', () => {
  it('groups whole parts and leaves decimals alone', () => {
    expect(groupedParts('12345.6789')).toEqual([['12', '345'], '.6789']);
  });

  it('leaves words, hashes and identifiers alone', () => {
    for (const text of ['IMG2874.m4a', '#123456', 'a1-2345', 'motor_2874']) expect(groupedParts(text)).toEqual([text]);
  });

  it('keeps a unit on the line of its number', () => {
    expect(groupedParts('at 6 V')).toEqual(['at 6\u00a0V']);
    expect(groupedParts('2874 rpm')).toEqual([['2', '874'], '\u00a0rpm']);
  });

  it('changes nothing but the space before a unit', () => {
    fc.assert(
      fc.property(fc.string(), (text) => {
        expect(flat(text).replaceAll('\u00a0', ' ')).toBe(text.replaceAll('\u00a0', ' '));
      }),
    );
  });
});

describe('thinSpaced', () => {
  it('puts a thin space between the groups', () => {
    expect(thinSpaced('10000')).toBe('10\u2009000');
  });
});
