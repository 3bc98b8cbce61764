import { describe, expect, it } from 'vitest';
import { normalSample } from '#lib/statistics/normalSample.ts';

/** NIST Statistical Reference Datasets, univariate: made to break one-pass sums. */
const NUM_ACC_1 = [10_000_001, 10_000_003, 10_000_002];
const NUM_ACC_4 = [10_000_000.2, ...Array.from({ length: 500 }, () => [10_000_000.1, 10_000_000.3]).flat()];

describe('normalSample', () => {
  it('gives the certified mean and deviation of NIST NumAcc1', () => {
    const { mean, standardDeviation } = normalSample(NUM_ACC_1);
    expect(mean.value).toBe(10_000_002);
    expect(standardDeviation.value).toBe(1);
  });

  it('gives those of NIST NumAcc4 to the digits that its numbers carry', () => {
    const { mean, standardDeviation } = normalSample(NUM_ACC_4);
    // 10000000.2 itself is only known to 1e-9 as a double, which limits the deviation of 0.1 to some 1e-8.
    expect(Math.abs(mean.value / 10_000_000.2 - 1)).toBeLessThan(1e-14);
    expect(Math.abs(standardDeviation.value / 0.1 - 1)).toBeLessThan(1e-7);
  });

  it('puts 4.303 standard errors around the mean of three values', () => {
    const { mean } = normalSample([99, 100, 101]);
    // t for two degrees of freedom, 95 %: NIST Technical Note 1297, Table B.1, prints 4.30.
    expect(mean.high - 100).toBeCloseTo(4.3027 / Math.sqrt(3), 4);
    expect(mean.low).toBeCloseTo(200 - mean.high, 10);
  });

  it('covers a true deviation of 1 in 95 % of 2,000 seeded samples of five', () => {
    let state = 20_261;
    const uniform = () => {
      state = (state * 48_271) % 2_147_483_647;
      return state / 2_147_483_647;
    };
    const normal = () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform());
    let covered = 0;
    for (let trial = 0; trial < 2000; trial += 1) {
      const { low, high } = normalSample(Array.from({ length: 5 }, normal)).standardDeviation;
      if (low <= 1 && high >= 1) covered += 1;
    }
    // Binomial spread of 2,000 trials is 0.5 %; four of them.
    expect(Math.abs(covered / 2000 - 0.95)).toBeLessThan(0.02);
  });

  it('refuses a single value, which says nothing about scatter', () => {
    expect(() => normalSample([1])).toThrow('normalSample: values must hold at least 2, got 1');
  });
});
