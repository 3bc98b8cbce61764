import { describe, expect, it } from 'vitest';
import { parseUploadFields } from '#http/upload/parseUploadFields.ts';
import { ServerError } from '#server/errors.ts';

const fieldsOf = (texts: Record<string, unknown>): string[] => {
  try {
    parseUploadFields(texts);
    return [];
  } catch (error) {
    return (error as ServerError).fieldErrors.map(({ field }) => field);
  }
};

describe('parseUploadFields', () => {
  it('reads plain decimals with point or comma', () => {
    expect(parseUploadFields({ supplyVolts: '4.5', currentAmps: '0,12', rpmMin: '60' })).toEqual({
      supplyVolts: 4.5,
      currentAmps: 0.12,
      rpmMin: 60,
    });
  });

  it('takes an empty field for one that was not filled in', () => {
    expect(parseUploadFields({ supplyVolts: '', note: '', orders: '', sessionId: '' })).toEqual({});
  });

  it('reads orders with commas or in JSON', () => {
    expect(parseUploadFields({ orders: '6, 12.5' })).toEqual({ orders: [6, 12.5] });
    expect(parseUploadFields({ orders: ' [6,12.5]' })).toEqual({ orders: [6, 12.5] });
  });

  it.each(['[6,', '[[6]]', '{"a":1}', '6,', '6 12', '[null]', '["6"]'])('refuses the orders %s', (orders) => {
    expect(fieldsOf({ orders })[0]).toMatch(/^orders/);
  });

  it('names every field that is wrong, also lists and bytes that are no text', () => {
    expect(fieldsOf({ supplyVolts: '1e5', eventsPerTurn: '0', owner: 'x' })).toEqual([
      'eventsPerTurn',
      'supplyVolts',
      'owner',
    ]);
    expect(fieldsOf({ note: ['a', 'b'], sessionId: 'a\uFFFDb' })).toEqual(['note', 'sessionId']);
  });
});
