import { describe, expect, it } from 'vitest';
import { analyseRecording } from '#lib/analysis/analyseRecording.ts';
import { findShaft } from '#lib/analysis/findShaft.ts';
import { isHumAlone, isMainsRate } from '#lib/analysis/mainsEvidence.ts';
import { DEFAULT_ANALYSIS_SETTINGS } from '#lib/analysis/settings.ts';
import { commutatorSound } from '#lib/signal/synthesis/motorSounds.ts';
import { type MotorSoundOptions, synthesiseMotor } from '#lib/signal/synthesis/synthesiseMotor.ts';

const sampleRateHz = 48_000;

function room(parts: Partial<MotorSoundOptions>): Float32Array {
  return synthesiseMotor({
    seed: 31,
    durationSeconds: 6,
    sampleRateHz,
    speed: [{ timeSeconds: 0, shaftSpeedRpm: 0 }],
    noise: { colour: 'pink', levelDecibels: -46 },
    ...parts,
  }).samples;
}

const tone = (frequencyHz: number, harmonicCount: number) => ({ frequencyHz, amplitude: 0.02, harmonicCount });

function readingOf(samples: Float32Array, eventsPerTurn: number) {
  const settings = { ...DEFAULT_ANALYSIS_SETTINGS, eventsPerTurn };
  return analyseRecording({ channels: [samples], sampleRateHz, settings }).reading;
}

function bestOf(samples: Float32Array, eventsPerTurn: number) {
  const [best] = findShaft({ samples, sampleRateHz }, { ...DEFAULT_ANALYSIS_SETTINGS, eventsPerTurn }).ranked;
  if (!best) throw new Error('bestOf: no hypothesis');
  return best;
}

describe('isHumAlone', () => {
  it.each([
    ['50 Hz and its first multiples', [tone(50, 4)]],
    ['60 Hz and its first multiples', [tone(60, 4)]],
    ['100, 200 and 300 Hz', [tone(100, 1), tone(200, 1), tone(300, 1)]],
  ])('holds for %s in pink noise, whatever the events per turn', (_, fixedTones) => {
    const samples = room({ fixedTones });
    for (const eventsPerTurn of [1, 6, 14]) {
      expect(readingOf(samples, eventsPerTurn)).toMatchObject({ status: 'no-rotation', reason: 'hum' });
    }
  });

  it('does not hold for 52 Hz and its multiples, which are no mains', () => {
    expect(isHumAlone(bestOf(room({ fixedTones: [tone(52, 4)] }), 1))).toBe(false);
  });

  it('does not hold for a motor of 2170 rpm beside hum, which is measured within 0.5 %', () => {
    const speed = [{ timeSeconds: 0, shaftSpeedRpm: 2170 }];
    const motor = room({ ...commutatorSound(6), speed, wanderFraction: 0.0005, fixedTones: [tone(50, 4)] });
    const reading = readingOf(motor, 6);
    expect(reading.status === 'measured' && Math.abs(reading.speed.shaftSpeedRpm / 2170 - 1)).toBeLessThan(0.005);
  });
});

describe('isMainsRate', () => {
  it('holds for the multiples of 50 Hz and not for those of 52 Hz', () => {
    expect(isMainsRate(bestOf(room({ fixedTones: [tone(50, 4)] }), 1))).toBe(true);
    expect(isMainsRate(bestOf(room({ fixedTones: [tone(52, 4)] }), 1))).toBe(false);
  });
});
