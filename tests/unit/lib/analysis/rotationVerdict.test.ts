import { describe, expect, it } from 'vitest';
import { findShaft } from '#lib/analysis/findShaft.ts';
import { rotationVerdict } from '#lib/analysis/rotationVerdict.ts';
import { LEAST_SIGNIFICANCE } from '#lib/analysis/significance.ts';
import { DEFAULT_ANALYSIS_SETTINGS } from '#lib/analysis/settings.ts';
import { TABLE_TOP_RESONANCES, excite } from '#lib/signal/synthesis/resonance.ts';
import { colouredNoise } from '#lib/signal/synthesis/noise.ts';
import { createRandom } from '#lib/signal/synthesis/random.ts';

const sampleRateHz = 16_000;

function verdictOf(samples: Float32Array, eventsPerTurn = 1) {
  const search = findShaft({ samples, sampleRateHz }, { ...DEFAULT_ANALYSIS_SETTINGS, eventsPerTurn });
  return rotationVerdict(search, samples.length / sampleRateHz, false);
}

describe('rotationVerdict', () => {
  it('stays below the threshold for white and pink noise of twenty seeds', () => {
    for (let seed = 0; seed < 20; seed++) {
      const random = createRandom(1000 + seed);
      const noise = colouredNoise(seed % 2 === 0 ? 'white' : 'pink', {
        sampleCount: 4 * sampleRateHz,
        sampleRateHz,
        random,
      });
      const { reason, significance } = verdictOf(
        Float32Array.from(noise, (value) => 0.1 * value),
        1 + (seed % 7),
      );
      expect(reason).toBe('nothing-periodic');
      expect(significance).toBeLessThan(LEAST_SIGNIFICANCE);
    }
  });

  it('does not take footsteps, two a second with 5 % scatter, for a shaft', () => {
    const random = createRandom(6);
    const impulses = new Float64Array(10 * sampleRateHz);
    for (let time = 0.3; time < 10; time += 0.5 * (1 + 0.05 * random.normal()))
      impulses[Math.floor(time * sampleRateHz)] = 0.3;
    const steps = new Float64Array(impulses.length);
    excite(steps, impulses, TABLE_TOP_RESONANCES.slice(0, 2), sampleRateHz);
    expect(verdictOf(Float32Array.from(steps, (value) => value + 0.002 * random.normal())).reason).toBe(
      'nothing-periodic',
    );
  });
});
