import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { decibelsFromPower } from '#lib/units/decibels.ts';
import {
  coherentGain,
  cosineSumWindow,
  equivalentNoiseBandwidthBins,
  hannWindow,
  scallopingPowerRatio,
} from '#lib/signal/window.ts';

/** Made by scripts/reference/fftValues.py with NumPy. */
const { windows } = JSON.parse(readFileSync(new URL('fftValues.json', import.meta.url), 'utf8')) as {
  windows: Record<
    string,
    {
      coefficients: number[];
      coherentGain: number;
      noiseBandwidthBins: number;
      scallopingDecibels: number;
    }
  >;
};

describe('hannWindow', () => {
  it('is 0, 0.5, 1, 0.5 for four samples', () => {
    for (const [sample, value] of [0, 0.5, 1, 0.5].entries()) expect(hannWindow(4)[sample]).toBeCloseTo(value, 15);
  });

  // F. Harris (1978), table I: ENBW 1.50 bins, scalloping loss 1.42 dB, coherent gain 0.50.
  it('has the figures of Harris 1978: 1.5 bins, 1.42 dB, gain 0.5', () => {
    const window = hannWindow(4096);
    expect(equivalentNoiseBandwidthBins(window)).toBeCloseTo(1.5, 9);
    expect(-decibelsFromPower(scallopingPowerRatio(window))).toBeCloseTo(1.42, 2);
    expect(coherentGain(window)).toBeCloseTo(0.5, 12);
  });
});

describe('cosineSumWindow', () => {
  it.each(Object.entries(windows))('agrees with NumPy on %s', (_, expected) => {
    const window = cosineSumWindow(4096, expected.coefficients);
    expect(coherentGain(window)).toBeCloseTo(expected.coherentGain, 10);
    expect(equivalentNoiseBandwidthBins(window)).toBeCloseTo(expected.noiseBandwidthBins, 9);
    expect(-decibelsFromPower(scallopingPowerRatio(window))).toBeCloseTo(expected.scallopingDecibels, 8);
  });

  // Harris (1978) as printed: Hamming ENBW 1.36, 4-term Blackman–Harris ENBW 2.00 and scalloping 0.83 dB.
  it('has the printed figures of Hamming and Blackman–Harris', () => {
    expect(equivalentNoiseBandwidthBins(cosineSumWindow(4096, [0.54, 0.46]))).toBeCloseTo(1.36, 2);
    const blackmanHarris = cosineSumWindow(4096, [0.35875, 0.48829, 0.14128, 0.01168]);
    expect(equivalentNoiseBandwidthBins(blackmanHarris)).toBeCloseTo(2.0, 1);
    expect(-decibelsFromPower(scallopingPowerRatio(blackmanHarris))).toBeCloseTo(0.83, 2);
  });
});
