import { describe, expect, it } from 'vitest';
import { likelyNext } from '#components/recording/upload/likelyNext.ts';
import { recordingView } from '#tests/factories/recordingView.ts';

const at = (supplyVolts: number | null) => recordingView({ supplyVolts });

describe('likelyNext', () => {
  it('goes on with the step of 1.5 V', () => {
    expect(likelyNext([at(4.5), at(3)])).toMatchObject({ build: { name: 'Heron' }, supplyVolts: 6 });
  });

  it('does not show the rounding of 0.1 + 0.2 V', () => {
    expect(likelyNext([at(0.2), at(0.1)])?.supplyVolts).toBe(0.3);
  });

  it.each([
    ['the voltage went down', [at(3), at(6)], 3],
    ['the voltage stayed', [at(6), at(6)], 6],
    ['there is only one recording', [at(6)], 6],
    ['the one before was of another session', [at(6), { ...at(4.5), sessionId: null }], 6],
    ['nobody wrote the voltage down', [at(null), at(3)], null],
  ])('repeats the voltage when %s', (_, recordings, volts) => {
    expect(likelyNext(recordings)?.supplyVolts).toBe(volts);
  });

  it.each([
    ['without recordings', []],
    ['without a build', [recordingView({ build: null })]],
  ])('is null %s', (_, recordings) => {
    expect(likelyNext(recordings)).toBeNull();
  });
});
