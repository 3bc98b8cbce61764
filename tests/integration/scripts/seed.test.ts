import { execa } from 'execa';
import { join, resolve } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { openWorkerLab, until } from '#tests/support/workerLab.ts';

const lab = await openWorkerLab();
const { DEMO_ACCOUNTS, DEMO_PASSWORD } = await import('#scripts/demo/demoAccounts.ts');
const { DEMO_SESSIONS } = await import('#scripts/demo/demoScenario.ts');
const { isPasswordOf } = await import('#server/auth/passwordHash.ts');
const { Account } = await import('#server/models/Account.ts');
const { Bench } = await import('#server/models/Bench.ts');
const { Build } = await import('#server/models/Build.ts');
const { Membership } = await import('#server/models/Membership.ts');
const { Reading } = await import('#server/models/Reading.ts');
const { Recording } = await import('#server/models/Recording.ts');
const { Session } = await import('#server/models/Session.ts');

const EVERY_RECORDING = DEMO_SESSIONS.flatMap(({ recordings }) => recordings);
/** The promise of the first engine on clean steady sound. */
const TOLERANCE_RATIO = 0.01;
const ANALYSED_WITHIN_SECONDS = 90;

async function seed(demo: 'on' | 'off'): Promise<number | undefined> {
  const bundle = join(process.env.RIPPLEBENCH_TEST_BUILD ?? '', 'scripts/seed.mjs');
  const env = { RIPPLEBENCH_DEMO: demo, HOST: '127.0.0.1' };
  return (await execa('node', [resolve('scripts/setup/invoke.mjs'), bundle], { env })).exitCode;
}

async function demoBenchId(): Promise<string> {
  return (await Bench.findOne({ rejectOnEmpty: true })).id;
}

async function rowCounts(): Promise<number[]> {
  const where = { benchId: await demoBenchId() };
  const counts = [Build, Session, Recording, Membership].map((model) => (model as typeof Build).count({ where }));
  return Promise.all([Bench.count(), Account.count(), ...counts]);
}

beforeAll(async () => {
  expect(await seed('off')).toBe(0);
  expect(await Bench.count()).toBe(0);
  expect(await seed('on')).toBe(0);
});
afterAll(() => lab.close());

describe('npm start, seeding the demo', () => {
  it('makes one bench with four accounts that know the password of the README', async () => {
    for (const { email, role } of DEMO_ACCOUNTS) {
      const account = await Account.loadByEmail(email);
      expect(await isPasswordOf(account?.passwordHash ?? null, DEMO_PASSWORD)).toBe(true);
      const where = { benchId: await demoBenchId(), accountId: account?.id ?? '' };
      expect(await Membership.findOne({ where })).toMatchObject({ role });
    }
  });

  it('changes nothing the second time, and respects what people changed since', async () => {
    const where = { benchId: await demoBenchId() };
    const build = await Build.findOne({ where: { ...where, name: 'Swift' }, rejectOnEmpty: true });
    await Build.update({ name: 'Swift II' }, { where: { ...where, id: build.id } });
    const before = await rowCounts();
    expect(before).toEqual([1, 4, 4, DEMO_SESSIONS.length, EVERY_RECORDING.length, 4]);
    expect(await seed('on')).toBe(0);
    expect(await rowCounts()).toEqual(before);
  });

  it('makes recordings that the worker measures within 1 % of the truth', async () => {
    await lab.startWorker({ threadCount: 2, leaseSeconds: 30 });
    const where = { benchId: await demoBenchId() };
    const states = async (): Promise<string[]> => (await Recording.findAll({ where })).map(({ state }) => state);
    const areOver = async (): Promise<boolean> => (await states()).every((state) => ['done', 'failed'].includes(state));
    await until('every demo recording is analysed', areOver, ANALYSED_WITHIN_SECONDS);
    const readings = new Map((await Reading.findAll({ where })).map((reading) => [reading.recordingId, reading]));
    const errors = (await Recording.findAll({ where })).flatMap(({ id, fileName }) => {
      const truth = EVERY_RECORDING.find((recording) => recording.fileName === fileName)?.trueRpm ?? null;
      if (truth === null) return [];
      const rpm = readings.get(id)?.shaftSpeedRpm ?? Number.NaN;
      return Math.abs(rpm / truth - 1) < TOLERANCE_RATIO
        ? []
        : [`${fileName}: ${String(rpm)} instead of ${String(truth)}`];
    });
    expect(errors).toEqual([]);
  });

  it('shows one recording that failed, and one in which nothing turned', async () => {
    const where = { benchId: await demoBenchId() };
    const broken = await Recording.findOne({ where: { ...where, fileName: 'heron-start-5.wav' } });
    expect(broken).toMatchObject({ state: 'failed', errorCode: 'not-finite' });
    const stalled = await Recording.findOne({ where: { ...where, fileName: 'kestrel-1v0.wav' }, rejectOnEmpty: true });
    const reading = await Reading.findOne({ where: { ...where, recordingId: stalled.id } });
    expect(reading).toMatchObject({ status: 'no-rotation', motion: 'none', shaftSpeedRpm: null });
  });

  it('follows the coast-down as a varying speed', async () => {
    const where = { benchId: await demoBenchId() };
    const run = await Recording.findOne({
      where: { ...where, fileName: 'dunlin-coast-down.wav' },
      rejectOnEmpty: true,
    });
    const reading = await Reading.findOne({ where: { ...where, recordingId: run.id } });
    expect(reading).toMatchObject({ status: 'measured', motion: 'varying' });
  });
});
