import { execa } from 'execa';
import { join, resolve } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { AnalysisLine } from '#scripts/analyse/analysisLine.ts';
import { createMediaFolder } from '#tests/fixtures/media/makeMedia.ts';
import { unpackDebianPackage } from '#tests/support/registryPackages.ts';

/**
 * Recordings that other people made of real things that turn or tick, taken from Debian's packages at test time:
 * gnome-shell-pomodoro-data (clock.ogg: a clock of 60 ticks a minute, measured 60.03 from its clicks; timer.ogg: an
 * uneven tick-tock, measured 134.4 pairs a minute) and mame-data (the spindle of a 3.5" floppy drive, nominally
 * 300 rpm, one turn measured as 0.2003 s = 299.6 rpm).
 */
const CLOCK_RPM = 60.03;
const TIMER_PAIRS_PER_MINUTE = 134.4;
const SPINDLE_RPM = 299.6;
/** The acceptance of the product. */
const TOLERANCE_FRACTION = 0.01;
/** The file holds one turn of a loop; the machine that plays it repeats it. */
const SPINDLE_REPEATS = 40;

const folder = await createMediaFolder();
let sounds: string;
let spindle: string;

async function analyse(file: string, ...options: string[]): Promise<AnalysisLine> {
  const bundle = join(process.env.RIPPLEBENCH_TEST_BUILD ?? '', 'scripts/analyse.mjs');
  const { stdout } = await execa('node', [resolve('scripts/setup/invoke.mjs'), bundle, '--json', ...options, file]);
  return JSON.parse(stdout) as AnalysisLine;
}

function expectSpeed({ status, rpm }: AnalysisLine, trueRpm: number): void {
  expect(status).toBe('measured');
  expect(Math.abs((rpm ?? 0) - trueRpm)).toBeLessThan(TOLERANCE_FRACTION * trueRpm);
}

beforeAll(async () => {
  sounds = join(await unpackDebianPackage('gnome-shell-pomodoro-data'), 'usr/share/gnome-pomodoro/sounds');
  const samples = join(await unpackDebianPackage('mame-data'), 'usr/share/games/mame/samples/floppy');
  spindle = folder.path('spindle.wav');
  await execa('sox', [join(samples, '35_spin_loaded.wav'), spindle, 'repeat', String(SPINDLE_REPEATS - 1)]);
}, 120_000);
afterAll(() => folder.remove());

describe('npm run analyse on real recordings', () => {
  const slow = ['--rpm-min', '20', '--rpm-max', '400'];

  it('hears a clock of 60 ticks a minute within 1 %', async () => {
    expectSpeed(await analyse(join(sounds, 'clock.ogg'), ...slow), CLOCK_RPM);
  });

  it('takes an uneven tick-tock as one turn a pair when two events a turn are given', async () => {
    const line = await analyse(join(sounds, 'timer.ogg'), ...slow, '--events-per-turn', '2');
    expectSpeed(line, TIMER_PAIRS_PER_MINUTE);
  });

  it('keeps the pair as the turn when one event a turn is given: a tick with a tock is one event', async () => {
    expectSpeed(await analyse(join(sounds, 'timer.ogg'), ...slow, '--events-per-turn', '1'), TIMER_PAIRS_PER_MINUTE);
  });

  it('hears a floppy spindle at its 300 rpm within 1 %', async () => {
    expectSpeed(await analyse(spindle), SPINDLE_RPM);
  });
});
