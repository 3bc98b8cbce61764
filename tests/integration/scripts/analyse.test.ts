import { execa } from 'execa';
import { join, resolve } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { AnalysisLine } from '#scripts/analyse/analysisLine.ts';
import { createMediaFolder } from '#tests/fixtures/media/makeMedia.ts';
import { BUZZ, BUZZ_RPM, encode, makeBuzz, makeSilence } from '#tests/support/labSounds.ts';

const MEASURABLE = ['--events-per-turn', '6', '--rpm-min', String(BUZZ.rpmMin), '--rpm-max', String(BUZZ.rpmMax)];
/** The acceptance of the product is 1 %. */
const TOLERANCE_RPM = 0.01 * BUZZ_RPM;

const folder = await createMediaFolder();
const bundle = (name: string) => join(process.env.RIPPLEBENCH_TEST_BUILD ?? '', name);

/** Runs the built program in an environment that knows no database and no Redis. */
async function analyse(...programArguments: string[]) {
  const invoke = resolve('scripts/setup/invoke.mjs');
  const result = await execa('node', [invoke, bundle('scripts/analyse.mjs'), ...programArguments], {
    cwd: folder.path('.'),
    reject: false,
    extendEnv: false,
    env: { PATH: process.env.PATH ?? '' },
  });
  return { status: result.exitCode, text: result.stdout, errorText: result.stderr };
}

function parsed(text: string): AnalysisLine[] {
  return text.split('\n').map((line) => JSON.parse(line) as AnalysisLine);
}

beforeAll(async () => {
  const buzz = await makeBuzz(folder, 'buzz.wav', 4);
  await makeSilence(folder, 'silence.wav', 3);
  await encode(folder, buzz, 'buzz.m4a', 'aac');
  await encode(folder, buzz, 'float.wav', 'pcm_f32le');
  await folder.write('broken.mp3', Buffer.alloc(50_000, 'not sound '));
  await folder.write('empty.wav', '');
});
afterAll(() => folder.remove());

describe('npm run analyse', () => {
  it('measures files of sox and ffmpeg within 1 % and ends with status 0', async () => {
    const { status, text } = await analyse('--json', ...MEASURABLE, 'buzz.wav', 'buzz.m4a', 'float.wav');
    const lines = parsed(text);
    expect(lines.map(({ file }) => file)).toEqual(['buzz.wav', 'buzz.m4a', 'float.wav']);
    for (const line of lines) {
      expect(line).toMatchObject({ status: 'measured', eventsPerTurn: 6, error: null, reason: null });
      expect(Math.abs((line.rpm ?? 0) - BUZZ_RPM)).toBeLessThan(TOLERANCE_RPM);
      expect(line.trend.length).toBeGreaterThanOrEqual(Math.floor(10 * (line.durationSeconds ?? 0)) - 10);
    }
    expect(lines[0]).toMatchObject({ sampleRate: 48_000, durationSeconds: 4 });
    expect(status).toBe(0);
  });

  it('ends with status 0 when nothing turned', async () => {
    const { status, text } = await analyse('--json', 'silence.wav');
    expect(parsed(text)[0]).toMatchObject({ status: 'no-rotation', motion: 'none', reason: 'silence', rpm: null });
    expect(status).toBe(0);
  });

  it('prints every line in input order and ends with status 1 when one file is broken', async () => {
    const files = ['broken.mp3', 'buzz.wav', 'empty.wav', 'nowhere.wav', 'silence.wav'];
    const { status, text } = await analyse('--json', '--jobs', '3', ...MEASURABLE, ...files);
    const lines = parsed(text);
    expect(lines.map(({ file }) => file)).toEqual(files);
    expect(lines.map(({ error }) => error?.code ?? null)).toEqual([
      'not-audio',
      null,
      'empty-file',
      'file-missing',
      null,
    ]);
    expect(status).toBe(1);
  });

  it('takes what each file needs from a list', async () => {
    const entries = [
      { file: 'buzz.wav', eventsPerTurn: 6, rpmMin: 800, rpmMax: 1200 },
      { file: 'buzz.wav', orders: [12], rpmMin: 400, rpmMax: 600 },
    ];
    await folder.write('list.jsonl', entries.map((entry) => JSON.stringify(entry)).join('\n'));
    const { status, text } = await analyse('--json', '--list', 'list.jsonl');
    const [asSix, asTwelve] = parsed(text);
    expect(asSix).toMatchObject({ file: 'buzz.wav', eventsPerTurn: 6 });
    expect(Math.abs((asSix?.rpm ?? 0) - BUZZ_RPM)).toBeLessThan(TOLERANCE_RPM);
    expect(asTwelve).toMatchObject({ file: 'buzz.wav', eventsPerTurn: 12 });
    expect(asTwelve?.rpm).toBeGreaterThanOrEqual(400);
    expect(asTwelve?.rpm).toBeLessThanOrEqual(600);
    expect(status).toBe(0);
  });

  it('gives people a table', async () => {
    const { status, text } = await analyse(...MEASURABLE, 'buzz.wav', 'empty.wav');
    const [headings, buzz, empty] = text.split('\n');
    expect(headings).toMatch(/^file +rpm +95 % interval/);
    expect(buzz).toMatch(/^buzz\.wav +\d+/);
    expect(empty).toContain('failed: The file is empty');
    expect(status).toBe(1);
  });

  it.each([[[]], [['--fast', 'buzz.wav']], [['--rpm-min', 'slow', 'buzz.wav']], [['--list', 'nowhere.jsonl']]])(
    'answers bad usage %j with status 2 and how it is used',
    async (programArguments) => {
      const { status, text, errorText } = await analyse(...programArguments);
      expect(errorText).toContain('Usage: npm run --silent analyse');
      expect(text).toBe('');
      expect(status).toBe(2);
    },
  );
});
