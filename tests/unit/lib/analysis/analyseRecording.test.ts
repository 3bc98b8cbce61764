import { describe, expect, it } from 'vitest';
import { analyseRecording } from '#lib/analysis/analyseRecording.ts';
import type { Analysis } from '#lib/analysis/analyseRecording.ts';
import { AnalysisRefused } from '#lib/analysis/analysisRefused.ts';
import { UNSURE_BELOW_CONFIDENCE } from '#lib/analysis/reading.ts';
import { DEFAULT_ANALYSIS_SETTINGS } from '#lib/analysis/settings.ts';
import type { AnalysisSettings } from '#lib/analysis/settings.ts';
import { commutatorSound, fanSound, twoContactSound } from '#lib/signal/synthesis/motorSounds.ts';
import type { MotorSound } from '#lib/signal/synthesis/motorSounds.ts';
import { createRandom } from '#lib/signal/synthesis/random.ts';
import { synthesiseMotor } from '#lib/signal/synthesis/synthesiseMotor.ts';

const sampleRateHz = 48_000;

function analysed(
  channels: Float32Array | readonly Float32Array[],
  settings: Partial<AnalysisSettings> = {},
): Analysis {
  const list = channels instanceof Float32Array ? [channels] : channels;
  return analyseRecording({ channels: list, sampleRateHz, settings: { ...DEFAULT_ANALYSIS_SETTINGS, ...settings } });
}

function speedOf({ reading }: Analysis): number {
  return reading.status === 'measured' ? reading.speed.shaftSpeedRpm : Number.NaN;
}

function reasonOf({ reading }: Analysis): string | null {
  return reading.status === 'no-rotation' ? reading.reason : null;
}

function motor(sound: MotorSound, shaftSpeedRpm: number, seed: number, seconds = 4): Float32Array {
  return synthesiseMotor({
    seed,
    durationSeconds: seconds,
    sampleRateHz,
    speed: [{ timeSeconds: 0, shaftSpeedRpm }],
    wanderFraction: 0.0005,
    noise: { colour: 'pink', levelDecibels: -45 },
    ...sound,
  }).samples;
}

function filled(seconds: number, value: (sample: number) => number): Float32Array {
  return Float32Array.from({ length: seconds * sampleRateHz }, (_, sample) => value(sample));
}

const cosine = (hertz: number, sample: number) => Math.cos((2 * Math.PI * hertz * sample) / sampleRateHz);

describe('analyseRecording', () => {
  // Seeded synthesis with known truth; 1 % is the promise for clean steady recordings.
  it.each([
    ['two contacts', 2, twoContactSound(), [304, 650, 1400]],
    ['3 segments', 6, commutatorSound(6), [1523, 4281, 19_870]],
    ['5 segments', 10, commutatorSound(10), [1523, 4281, 12_070]],
    ['7 segments', 14, commutatorSound(14), [1013, 5742, 18_240]],
    ['a fan of 3 blades', 3, fanSound(3), [611, 1797, 9120]],
  ] as const)('finds %s at %d events a turn within 1 %% and inside its interval', (_, eventsPerTurn, sound, speeds) => {
    for (const [seed, shaftSpeedRpm] of speeds.entries()) {
      const result = analysed(motor(sound, shaftSpeedRpm, 40 + seed), { eventsPerTurn });
      expect(Math.abs(speedOf(result) / shaftSpeedRpm - 1)).toBeLessThan(0.01);
      expect(result.reading).toMatchObject({ status: 'measured', motion: 'steady', eventsPerTurn });
    }
  });

  it('follows a run-up from 1500 to 4500 rpm within 2 % in nine tenths of the points', () => {
    const { samples, truth } = synthesiseMotor({
      seed: 5,
      durationSeconds: 8,
      sampleRateHz,
      speed: [
        { timeSeconds: 0, shaftSpeedRpm: 1500 },
        { timeSeconds: 1.5, shaftSpeedRpm: 1500 },
        { timeSeconds: 6.5, shaftSpeedRpm: 4500 },
      ],
      noise: { colour: 'pink', levelDecibels: -45 },
      ...commutatorSound(6),
    });
    const result = analysed(samples, { eventsPerTurn: 6 });
    expect(result.reading).toMatchObject({ status: 'measured', motion: 'varying' });
    const [time, speed] = result.series.find(({ name }) => name === 'trend')?.columns ?? [];
    expect(time?.values.length).toBeGreaterThanOrEqual(80);
    const errors = Array.from(speed?.values ?? [], (rpm, point) => {
      const at = Math.round((time?.values[point] ?? 0) / 0.05);
      return Math.abs(rpm / (truth.shaftSpeedRpm[Math.min(truth.shaftSpeedRpm.length - 1, at)] ?? 0) - 1);
    }).sort((a, b) => a - b);
    expect(errors[Math.floor(0.9 * errors.length)]).toBeLessThan(0.02);
  });

  it('marks a stop as a gap of the trend and calls the motion intermittent', () => {
    const { samples } = synthesiseMotor({
      seed: 8,
      durationSeconds: 9,
      sampleRateHz,
      speed: [
        { timeSeconds: 0, shaftSpeedRpm: 2400 },
        { timeSeconds: 3, shaftSpeedRpm: 2400 },
        { timeSeconds: 3.2, shaftSpeedRpm: 0 },
        { timeSeconds: 6, shaftSpeedRpm: 0 },
        { timeSeconds: 6.2, shaftSpeedRpm: 2400 },
      ],
      noise: { colour: 'white', levelDecibels: -50 },
      ...commutatorSound(6),
    });
    const result = analysed(samples, { eventsPerTurn: 6 });
    expect(result.reading).toMatchObject({ status: 'measured', motion: 'intermittent' });
    expect(Math.abs(speedOf(result) / 2400 - 1)).toBeLessThan(0.01);
    const speeds = result.series.find(({ name }) => name === 'trend')?.columns[1]?.values ?? new Float32Array();
    expect(speeds[45]).toBeNaN();
    expect(Math.abs((speeds[15] ?? 0) / 2400 - 1)).toBeLessThan(0.01);
  });

  // Closed forms: a rate of f Hz at k events a turn is 60 f / k rpm. Noiseless, so nothing but the method limits the error.
  it.each([
    ['1000.000 Hz at k = 1', 1, 60_000, (sample: number) => 0.2 * (cosine(1000, sample) + 0.5 * cosine(2000, sample))],
    [
      '440 Hz at k = 10',
      10,
      2640,
      (sample: number) =>
        0.1 * [1, 0.8, 0.6, 0.5, 0.4, 0.3].reduce((sum, a, h) => sum + a * cosine(440 * (h + 1), sample), 0),
    ],
  ] as const)('reads %s within 5 ppm', (_, eventsPerTurn, rpm, value) => {
    expect(Math.abs(speedOf(analysed(filled(6, value), { eventsPerTurn })) / rpm - 1)).toBeLessThan(5e-6);
  });

  it('reads clicks at 8.3333 Hz and k = 2 within 5 ppm of 250 rpm when the range rules out the double', () => {
    const clicks = filled(12, (sample) => {
      const since = sample % (sampleRateHz / (25 / 3));
      return since < 400 ? 0.5 * Math.exp(-since / 60) * Math.sin((2 * Math.PI * 2000 * since) / sampleRateHz) : 0;
    });
    const result = analysed(clicks, { eventsPerTurn: 2, minimumRpm: 100, maximumRpm: 400 });
    expect(Math.abs(speedOf(result) / 250 - 1)).toBeLessThan(5e-6);
  });

  it('offers both 250 and 500 rpm for even clicks that cannot tell them apart', () => {
    const clicks = filled(6, (sample) => {
      const since = sample % (sampleRateHz / (25 / 3));
      return since < 400 ? 0.5 * Math.exp(-since / 60) * Math.sin((2 * Math.PI * 2000 * since) / sampleRateHz) : 0;
    });
    const { reading } = analysed(clicks, { eventsPerTurn: 2 });
    const offered = reading.candidates.map(({ shaftSpeedRpm }) => Math.round(shaftSpeedRpm));
    expect(offered).toContain(250);
    expect(offered).toContain(500);
    // method: the tie must stay below 0.8.
    expect(reading.status === 'measured' ? reading.confidence : 1).toBeLessThan(0.8);
  });

  it('takes a clock correction: a clock 200 ppm fast makes the true speed 200 ppm higher', () => {
    const samples = motor(commutatorSound(6), 3000, 3);
    const plain = speedOf(analysed(samples, { eventsPerTurn: 6 }));
    expect(speedOf(analysed(samples, { eventsPerTurn: 6, clockCorrectionPpm: 200 })) / plain).toBeCloseTo(1.0002, 9);
  });

  it('analyses a stretch and keeps its times', () => {
    const result = analysed(motor(fanSound(3), 1800, 3, 6), { eventsPerTurn: 3, fromSeconds: 2, toSeconds: 5 });
    const times = result.series.find(({ name }) => name === 'trend')?.columns[0]?.values ?? new Float32Array();
    expect(times[0]).toBeCloseTo(2.05, 5);
    expect(times.length).toBe(30);
    expect(result.reading.durationSeconds).toBe(6);
  });

  it('answers no rotation to white noise of twelve seeds', () => {
    for (let seed = 0; seed < 12; seed++) {
      const random = createRandom(seed);
      const eventsPerTurn = [1, 2, 6, 10][seed % 4] ?? 1;
      expect(
        reasonOf(
          analysed(
            filled(2 + (seed % 3), () => 0.1 * random.normal()),
            { eventsPerTurn },
          ),
        ),
      ).toBe('nothing-periodic');
    }
  });

  it.each([
    ['silence', filled(2, () => 0), 'silence'],
    ['denormal samples', filled(2, (sample) => (sample % 2) * 1e-40), 'silence'],
    ['a constant', filled(2, () => 0.3), 'nothing-periodic'],
    ['a tenth of a second', filled(0.1, (sample) => cosine(500, sample)), 'too-short'],
    ['nothing', new Float32Array(0), 'too-short'],
  ])('answers no rotation to %s', (_, samples, reason) => {
    expect(reasonOf(analysed(samples))).toBe(reason);
  });

  it.each([50, 60, 49.98])('calls hum of %d Hz hum, whatever the events per turn', (mainsHz) => {
    const random = createRandom(2);
    const hum = filled(5, (sample) => {
      let value = 0.002 * random.normal();
      for (let harmonic = 1; harmonic <= 8; harmonic++)
        value += (0.05 / harmonic) * cosine(harmonic * mainsHz, sample + 50 * harmonic);
      return value;
    });
    for (const eventsPerTurn of [1, 6]) expect(reasonOf(analysed(hum, { eventsPerTurn }))).toBe('hum');
  });

  it('finds a motor in hum', () => {
    const samples = motor(commutatorSound(6), 4321, 6);
    const noisy = samples.map(
      (value, sample) => value + 0.05 * (cosine(50, sample) + 0.5 * cosine(150, sample) + 0.3 * cosine(250, sample)),
    );
    expect(Math.abs(speedOf(analysed(noisy, { eventsPerTurn: 6 })) / 4321 - 1)).toBeLessThan(0.01);
  });

  it('is at most unsure of a tune of half-second notes', () => {
    const semitones = [0, 4, 7, 12, 5, 9, 2, 7, 11, 4, 0, 7];
    let cycles = 0;
    const tune = filled(6, (sample) => {
      cycles += (220 * 2 ** ((semitones[Math.floor(sample / (sampleRateHz / 2))] ?? 0) / 12)) / sampleRateHz;
      return (
        0.1 * [1, 2, 3, 4].reduce((sum, harmonic) => sum + Math.cos(2 * Math.PI * harmonic * cycles) / harmonic, 0)
      );
    });
    const { reading } = analysed(tune);
    expect(reading.status === 'measured' ? reading.confidence : 0).toBeLessThan(UNSURE_BELOW_CONFIDENCE);
  });

  it('warns of clipping and still finds the speed', () => {
    const samples = motor(twoContactSound(), 900, 4).map((value) => Math.max(-0.5, Math.min(0.5, 8 * value)));
    const result = analysed(samples, { eventsPerTurn: 2 });
    expect(result.reading.warnings).toContain('clipped');
    expect(Math.abs(speedOf(result) / 900 - 1)).toBeLessThan(0.01);
  });

  it('warns of opposite channels and takes one of them', () => {
    const samples = motor(fanSound(3), 1800, 3);
    const result = analysed([samples, samples.map((value) => -value)], { eventsPerTurn: 3 });
    expect(result.reading.warnings).toEqual(['opposite-channels']);
    expect(Math.abs(speedOf(result) / 1800 - 1)).toBeLessThan(0.01);
  });

  it('warns of a dead channel and finds the same speed as without it', () => {
    const samples = motor(fanSound(3), 1800, 3);
    const result = analysed([samples, new Float32Array(samples.length)], { eventsPerTurn: 3 });
    expect(result.reading.warnings).toEqual(['dead-channel']);
    expect(speedOf(result)).toBe(speedOf(analysed(samples, { eventsPerTurn: 3 })));
  });

  it.each([
    ['not-finite', Number.NaN],
    ['not-finite', Infinity],
    ['out-of-range', 9],
  ])('refuses %s samples', (code, value) => {
    const samples = filled(1, () => 0.1);
    samples[777] = value;
    expect(() => analysed(samples)).toThrow(
      expect.objectContaining({ name: 'AnalysisRefused', code }) as AnalysisRefused,
    );
  });

  it('repeats the warnings of the decoder', () => {
    const { reading } = analyseRecording({
      channels: [filled(1, () => 0)],
      sampleRateHz,
      settings: DEFAULT_ANALYSIS_SETTINGS,
      warnings: ['header-mismatch'],
    });
    expect(reading.warnings).toContain('header-mismatch');
  });

  it.each([
    [{ eventsPerTurn: 0 }, 'eventsPerTurn must be > 0'],
    [{ minimumRpm: 500, maximumRpm: 100 }, '0 < minimumRpm < maximumRpm must hold'],
  ])('names the setting that is out of range: %o', (settings, message) => {
    expect(() =>
      analysed(
        filled(1, () => 0),
        settings,
      ),
    ).toThrow(message);
  });

  it('refuses channels that differ in length and no channel at all', () => {
    expect(() => analysed([new Float32Array(9), new Float32Array(8)])).toThrow('equally long');
    expect(() => analysed([])).toThrow('at least one channel');
  });

  it('carries every series within its bounds, finite but for the gaps of the trend', () => {
    const result = analysed(motor(commutatorSound(6), 3210, 9, 5), { eventsPerTurn: 6 });
    expect(result.series.map(({ name }) => name).sort()).toEqual([
      'envelopeSpectrum',
      'oneTurnAverage',
      'orderSpectrum',
      'spectrogram',
      'spectrum',
      'trend',
      'waveform',
    ]);
    for (const { name, columns } of result.series) {
      for (const { values } of columns) {
        expect(values.length).toBeLessThanOrEqual(name === 'spectrogram' ? 400 * 256 : 8192);
        expect(values.every((value) => Number.isFinite(value))).toBe(true);
      }
    }
  });

  it('puts the strongest order of a 3-segment motor at 6 and its line at the event rate', () => {
    const { series } = analysed(motor(commutatorSound(6), 3210, 9, 5), { eventsPerTurn: 6 });
    const strongest = (name: string) => {
      const [position, level] = series.find((each) => each.name === name)?.columns ?? [];
      const best = level?.values.indexOf(Math.max(...level.values)) ?? 0;
      return position?.values[best] ?? Number.NaN;
    };
    // Order 6 or one of its multiples, within a bin of the order spectrum.
    expect(Math.abs(strongest('orderSpectrum') / 6 - Math.round(strongest('orderSpectrum') / 6))).toBeLessThan(0.02);
    // 3210 rpm · 6 = 321 Hz.
    expect(Math.abs(strongest('spectrum') / 321 - Math.round(strongest('spectrum') / 321))).toBeLessThan(0.01);
  });
});
