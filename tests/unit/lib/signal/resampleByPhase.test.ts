import { describe, expect, it } from 'vitest';
import { averageSpectrum } from '#lib/signal/averageSpectrum.ts';
import { cyclesAt, eventPhase, knotSeconds } from '#lib/signal/eventTrack.ts';
import { resampleByPhase } from '#lib/signal/resampleByPhase.ts';

const sampleRateHz = 12_000;

describe('resampleByPhase', () => {
  it('turns a run-up from 100 to 200 Hz into one line at order 1', () => {
    const track = {
      eventHz: Float64Array.from({ length: 40 }, (_, knot) => 100 + 25 * knotSeconds(knot)),
      isActive: new Uint8Array(40).fill(1),
    };
    const phase = eventPhase(track);
    const samples = Float32Array.from({ length: 4 * sampleRateHz }, (_, n) =>
      Math.cos(2 * Math.PI * cyclesAt(phase, n / sampleRateHz)),
    );
    const resampled = resampleByPhase({ samples, sampleRateHz }, phase, {
      firstCycle: 2,
      cyclesPerSample: 1 / 64,
      sampleCount: 512 * 64,
    });
    const { power } = averageSpectrum(resampled, 1, 2 ** 15);
    const orderBin = 2 ** 15 / 64;
    // All of a sine's power of 0.5 in the three bins of a Hann line: 0.5 · 1.5; cubic interpolation loses below 0.1 %.
    const line = (power[orderBin - 1] as number) + (power[orderBin] as number) + (power[orderBin + 1] as number);
    expect(line).toBeGreaterThan(0.749 - 0.001);
    expect(line).toBeLessThan(0.751);
  });

  it('is 0 outside the recording', () => {
    const phase = eventPhase({ eventHz: new Float64Array(10).fill(50), isActive: new Uint8Array(10).fill(1) });
    const signal = { samples: new Float32Array(sampleRateHz).fill(1), sampleRateHz };
    const resampled = resampleByPhase(signal, phase, { firstCycle: 49, cyclesPerSample: 0.5, sampleCount: 6 });
    expect([...resampled]).toEqual([1, 1, 0, 0, 0, 0]);
  });
});
