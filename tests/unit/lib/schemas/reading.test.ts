import { describe, expect, it } from 'vitest';
import { analyseAgainRequest } from '#lib/schemas/reading.ts';

describe('analyseAgainRequest', () => {
  it.each<[string, unknown, string]>([
    ['channel', -1, 'Must be "auto" or a whole number from 0 to 7.'],
    ['channel', 8, 'Must be "auto" or a whole number from 0 to 7.'],
    ['channel', 'left', 'Must be "auto" or a whole number from 0 to 7.'],
    ['fromSeconds', -0.1, 'Must be a number from 0 to 600 s.'],
    ['toSeconds', 600.1, 'Must be a number from 0 to 600 s.'],
    ['toSeconds', '5', 'Must be a number from 0 to 600 s.'],
  ])('refuses %s = %j with the whole range', (field, value, message) => {
    const { error } = analyseAgainRequest.safeParse({ [field]: value });
    expect(error?.issues).toEqual([expect.objectContaining({ path: [field], message })]);
  });

  it('takes the ends of the ranges', () => {
    for (const request of [{ channel: 'auto' }, { channel: 7 }, { channel: 0, fromSeconds: 0, toSeconds: 600 }]) {
      expect(analyseAgainRequest.safeParse(request).success).toBe(true);
    }
  });
});
