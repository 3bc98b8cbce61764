import { describe, expect, it } from 'vitest';
import { checkConditions, NO_CONDITIONS } from '#components/recording/upload/uploadConditions.ts';

const benchId = '0198f6a0-0000-7000-8000-000000000001';
const buildId = '0198f6a0-0000-7000-8000-000000000002';

describe('checkConditions', () => {
  it('sends the bench alone when every blank is empty', () => {
    expect(checkConditions(benchId, NO_CONDITIONS)).toEqual({ isValid: true, fields: { benchId } });
  });

  it('takes a decimal comma', () => {
    const checked = checkConditions(benchId, { ...NO_CONDITIONS, supplyVolts: '4,5', currentAmps: ' 0,31 ' });
    expect(checked).toEqual({ isValid: true, fields: { benchId, supplyVolts: 4.5, currentAmps: 0.31 } });
  });

  it('leaves the count to the build when one is chosen', () => {
    const conditions = { ...NO_CONDITIONS, eventsPerTurn: '6' };
    expect(checkConditions(benchId, conditions)).toMatchObject({ fields: { eventsPerTurn: 6 } });
    expect(checkConditions(benchId, { ...conditions, buildId })).toEqual({
      isValid: true,
      fields: { benchId, buildId },
    });
  });

  it('names each blank that cannot be right with its range', () => {
    const checked = checkConditions(benchId, { ...NO_CONDITIONS, supplyVolts: 'six', currentAmps: '-1' });
    expect(checked).toEqual({
      isValid: false,
      errors: {
        supplyVolts: 'Must be a number from 0 to 1000 V.',
        currentAmps: 'Must be a number from 0 to 1000 A.',
      },
    });
  });
});
