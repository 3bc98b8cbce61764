import { describe, expect, it } from 'vitest';
import { conditionsOf, conditionTexts, NO_CONDITION_TEXTS } from '#components/session/conditionTexts.ts';
import { conditionsText } from '#components/session/conditionsText.ts';

const none = { supplyVolts: null, load: null, ambientCelsius: null, note: null };
const all = { supplyVolts: 4.5, load: 'no load', ambientCelsius: -2, note: 'Brushes new.' };

describe('conditionsText', () => {
  it.each([
    [all, 'At 4.5 V, no load, −2 °C. Brushes new.'],
    [{ ...none, load: '80 mm fan' }, '80 mm fan.'],
    [none, 'No conditions were written down.'],
  ])('of %j', (conditions, text) => {
    expect(conditionsText(conditions)).toBe(text);
  });
});

describe('conditionTexts', () => {
  it('gives back through conditionsOf what was put in', () => {
    expect(conditionsOf(conditionTexts(all))).toEqual(all);
    expect(conditionsOf(conditionTexts(none))).toEqual(none);
  });
});

describe('conditionsOf', () => {
  it('is NaN for a figure that is none', () => {
    expect(conditionsOf({ ...NO_CONDITION_TEXTS, supplyVolts: 'six' }).supplyVolts).toBeNaN();
  });
});
