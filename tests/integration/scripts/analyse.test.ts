import { execa } from 'execa';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { AnalysisLine } from '#scripts/analyse/analysisLine.ts';

/** Events of a sawtooth at 97 Hz (no multiple of the mains), six a turn: 970 rpm. Sox vouches for the rate, not we. */
const EVENT_HZ = 97;
const TRUE_RPM = 970;
const MEASURABLE = ['--events-per-turn', '6', '--rpm-min', '800', '--rpm-max', '1200'];
/** The acceptance of the product is 1 %. */
const TOLERANCE_RPM = 9.7;

let folder = '';
const bundle = (name: string) => join(process.env.RIPPLEBENCH_TEST_BUILD ?? '', name);

/** Runs the built program in an environment that knows no database and no Redis. */
async function analyse(...programArguments: string[]) {
  const invoke = resolve('scripts/setup/invoke.mjs');
  const result = await execa('node', [invoke, bundle('scripts/analyse.mjs'), ...programArguments], {
    cwd: folder,
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
  folder = mkdtempSync(join(tmpdir(), 'ripplebench-analyse-'));
  const tone = ['synth', '4', 'sawtooth', String(EVENT_HZ), 'gain', '-12'];
  await execa('sox', ['-n', '-r', '48000', '-b', '16', '-c', '1', 'saw.wav', ...tone], { cwd: folder });
  await execa('sox', ['-n', '-r', '48000', '-b', '16', '-c', '1', 'silence.wav', 'trim', '0', '3'], { cwd: folder });
  await execa('ffmpeg', ['-v', 'error', '-i', 'saw.wav', '-c:a', 'aac', 'saw.m4a'], { cwd: folder });
  await execa('ffmpeg', ['-v', 'error', '-i', 'saw.wav', '-c:a', 'pcm_f32le', 'float.wav'], { cwd: folder });
  writeFileSync(join(folder, 'broken.mp3'), Buffer.alloc(50_000, 'not sound '));
  writeFileSync(join(folder, 'empty.wav'), '');
});
afterAll(() => {
  rmSync(folder, { recursive: true });
});

describe('npm run analyse', () => {
  it('measures files of sox and ffmpeg within 1 % and ends with status 0', async () => {
    const { status, text } = await analyse('--json', ...MEASURABLE, 'saw.wav', 'saw.m4a', 'float.wav');
    const lines = parsed(text);
    expect(lines.map(({ file }) => file)).toEqual(['saw.wav', 'saw.m4a', 'float.wav']);
    for (const line of lines) {
      expect(line).toMatchObject({ status: 'measured', eventsPerTurn: 6, error: null, reason: null });
      expect(Math.abs((line.rpm ?? 0) - TRUE_RPM)).toBeLessThan(TOLERANCE_RPM);
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
    const files = ['broken.mp3', 'saw.wav', 'empty.wav', 'nowhere.wav', 'silence.wav'];
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
      { file: 'saw.wav', eventsPerTurn: 6, rpmMin: 800, rpmMax: 1200 },
      { file: 'saw.wav', orders: [12], rpmMin: 400, rpmMax: 600 },
    ];
    writeFileSync(join(folder, 'list.jsonl'), entries.map((entry) => JSON.stringify(entry)).join('\n'));
    const { status, text } = await analyse('--json', '--list', 'list.jsonl');
    const [asSix, asTwelve] = parsed(text).map(({ rpm }) => rpm ?? 0);
    expect(Math.abs((asSix ?? 0) - TRUE_RPM)).toBeLessThan(TOLERANCE_RPM);
    expect(Math.abs(2 * (asTwelve ?? 0) - TRUE_RPM)).toBeLessThan(TOLERANCE_RPM);
    expect(status).toBe(0);
  });

  it('gives people a table', async () => {
    const { status, text } = await analyse(...MEASURABLE, 'saw.wav', 'empty.wav');
    const [headings, saw, empty] = text.split('\n');
    expect(headings).toMatch(/^file +rpm +95 % interval/);
    expect(saw).toMatch(/^saw\.wav +\d+/);
    expect(empty).toContain('failed: The file is empty');
    expect(status).toBe(1);
  });

  it.each([[[]], [['--fast', 'saw.wav']], [['--rpm-min', 'slow', 'saw.wav']], [['--list', 'nowhere.jsonl']]])(
    'answers bad usage %j with status 2 and how it is used',
    async (programArguments) => {
      const { status, text, errorText } = await analyse(...programArguments);
      expect(errorText).toContain('Usage: npm run --silent analyse');
      expect(text).toBe('');
      expect(status).toBe(2);
    },
  );
});
