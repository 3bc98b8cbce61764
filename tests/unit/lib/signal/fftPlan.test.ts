import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { fftPlan } from '#lib/signal/fftPlan.ts';

/** Made by scripts/reference/fftValues.py with NumPy. */
const reference = JSON.parse(readFileSync(new URL('fftValues.json', import.meta.url), 'utf8')) as {
  size: number;
  real: number[];
  imaginary: number[];
};

function transformed(samples: readonly number[]): { real: number; imaginary: number }[] {
  const plan = fftPlan(samples.length);
  plan.input.set(samples);
  const spectrum = plan.transformReal();
  return Array.from({ length: samples.length / 2 + 1 }, (_, bin) => ({
    real: spectrum[2 * bin] as number,
    imaginary: spectrum[2 * bin + 1] as number,
  }));
}

describe('fftPlan', () => {
  it('agrees with NumPy on 64 samples within 1e-10', () => {
    const samples = Array.from({ length: reference.size }, (_, n) => Math.sin(0.37 * n ** 2) + n / 64);
    for (const [bin, { real, imaginary }] of transformed(samples).entries()) {
      expect(real).toBeCloseTo(reference.real[bin] as number, 10);
      expect(imaginary).toBeCloseTo(reference.imaginary[bin] as number, 10);
    }
  });

  // check-values.json, fft/parseval: Σ|x|² = 60, Σ|X|² = 480.
  it("keeps Parseval's identity: 60 in time is 480 over 8 bins", () => {
    const bins = transformed([3, 1, -2, 5, 0, 4, -1, 2]);
    const powers = bins.map(({ real, imaginary }) => real ** 2 + imaginary ** 2);
    const total = powers.reduce((sum, power, bin) => sum + (bin === 0 || bin === 4 ? power : 2 * power), 0);
    expect(total).toBeCloseTo(480, 9);
  });

  // check-values.json, fft/fft-impulse.
  it('turns an impulse into ones, ones into 16 at bin 0, and a cosine of 3 periods into 8 at bin 3', () => {
    const impulse = transformed([1, ...Array.from({ length: 15 }, () => 0)]);
    expect(impulse.every(({ real, imaginary }) => Math.abs(Math.hypot(real, imaginary) - 1) < 1e-12)).toBe(true);
    const ones = transformed(Array.from({ length: 16 }, () => 1));
    expect(ones[0]?.real).toBeCloseTo(16, 9);
    expect(ones[5]?.real).toBeCloseTo(0, 9);
    const cosine = transformed(Array.from({ length: 16 }, (_, n) => Math.cos((2 * Math.PI * 3 * n) / 16)));
    expect(cosine[3]?.real).toBeCloseTo(8, 9);
  });

  // check-values.json, fft/fft-shift: a shift by 3 of 8 turns bin 1 by −135°.
  it('turns bin 1 of 8 by −135° when the samples move by 3', () => {
    const samples = [3, 1, -2, 5, 0, 4, -1, 2];
    const before = transformed(samples)[1];
    const after = transformed(samples.map((_, n) => samples[(n + 5) % 8] as number))[1];
    const angle = (bin: { real: number; imaginary: number } | undefined) =>
      Math.atan2(bin?.imaginary ?? 0, bin?.real ?? 0);
    const turnedDegrees = ((angle(after) - angle(before)) * 180) / Math.PI;
    expect(((turnedDegrees + 540) % 360) - 180).toBeCloseTo(-135, 9);
  });

  it('gives back the same plan for the same size', () => {
    expect(fftPlan(256)).toBe(fftPlan(256));
  });

  it.each([0, 3, 1, 2 ** 23, Number.NaN])('refuses the size %d', (size) => {
    expect(() => fftPlan(size)).toThrow('fftPlan: size must be a power of two');
  });
});
