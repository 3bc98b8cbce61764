import { createHash } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { DEFAULT_ANALYSIS_SETTINGS } from '#lib/analysis/settings.ts';
import { settingsHash } from '#server/usecases/settingsHash.ts';

describe('settingsHash', () => {
  it('does not depend on the order of the fields', () => {
    const reversed = Object.fromEntries(Object.entries(DEFAULT_ANALYSIS_SETTINGS).reverse());
    expect(settingsHash(reversed as typeof DEFAULT_ANALYSIS_SETTINGS)).toEqual(settingsHash(DEFAULT_ANALYSIS_SETTINGS));
  });

  it('differs when one value or the order of the orders differs', () => {
    const variants = [
      DEFAULT_ANALYSIS_SETTINGS,
      { ...DEFAULT_ANALYSIS_SETTINGS, eventsPerTurn: 2 },
      { ...DEFAULT_ANALYSIS_SETTINGS, channel: 0 },
      { ...DEFAULT_ANALYSIS_SETTINGS, orders: [2, 6] },
      { ...DEFAULT_ANALYSIS_SETTINGS, orders: [6, 2] },
    ];
    const hashes = new Set(variants.map((settings) => settingsHash(settings).toString('hex')));
    expect(hashes.size).toBe(variants.length);
  });

  it('is the SHA-256 of the sorted fields, 32 bytes', () => {
    const text =
      '[["channel","auto"],["clockCorrectionPpm",null],["eventsPerTurn",1],["fromSeconds",null],["maximumRpm",60000],' +
      '["minimumRpm",60],["orders",[]],["toSeconds",null]]';
    expect(settingsHash(DEFAULT_ANALYSIS_SETTINGS)).toEqual(createHash('sha256').update(text).digest());
  });
});
