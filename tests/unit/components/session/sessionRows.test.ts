import { describe, expect, it } from 'vitest';
import { orderedRows, sessionRows } from '#components/session/sessionRows.ts';
import { readingView, recordingView } from '#tests/factories/recordingView.ts';

const recordings = [
  recordingView({ id: 'queued', status: 'queued', reading: null, supplyVolts: null, build: null }),
  recordingView({ id: 'fast', supplyVolts: 6, note: 'brushes bedded in' }),
  recordingView({ id: 'slow', supplyVolts: 3, reading: readingView({ rpm: 1400, rpmLow: 1390, rpmHigh: 1410 }) }),
];
const rows = sessionRows(recordings, 7);
const idsBy = (order: Parameters<typeof orderedRows>[1]) => orderedRows(rows, order).map((row) => row.recordingId);

describe('sessionRows', () => {
  it('counts from the whole session although only the newest 3 of 7 are here', () => {
    expect(rows.map((row) => row.order)).toEqual([7, 6, 5]);
  });

  it('puts build and conditions into a few words, and nothing where nothing is known', () => {
    expect(rows.map((row) => row.circumstances)).toEqual(['', 'Heron · 6 V · brushes bedded in', 'Heron · 3 V']);
  });

  it('says beside the speed how far to trust it', () => {
    expect(rows[1]?.standing).toEqual({
      shape: null,
      sentence: 'Between 2868 and 2880; very likely right (97 in 100)',
    });
  });
});

describe('orderedRows', () => {
  it('gives newest first', () => {
    expect(idsBy('newest')).toEqual(['queued', 'fast', 'slow']);
  });

  it.each(['supply', 'speed'] as const)('by %s puts the smallest first and the unknown last', (order) => {
    expect(idsBy(order)).toEqual(['slow', 'fast', 'queued']);
  });
});
