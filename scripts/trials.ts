/** `npm run trials`: how right, how sure and how fast the engine is, on recordings made from seeds. */
import { mkdir, writeFile } from 'node:fs/promises';
import { join, resolve } from 'node:path';
import { clock } from '#server/clock.ts';
import { MOTOR_CLASSES } from './trials/motorClasses.ts';
import { MOTORLESS_CLASSES } from './trials/motorlessClasses.ts';
import { runTrial } from './trials/runTrial.ts';
import { parseTrialArguments, TrialUsageError, USAGE } from './trials/trialArguments.ts';
import { trialReport, type TrialReport } from './trials/trialReport.ts';
import { trialTables } from './trials/trialTable.ts';

const DONE = 0;
const BAD_USAGE = 2;
const DATE_LENGTH = 'YYYY-MM-DD'.length;

/** @returns the exit status: 0 whatever the figures are, 2 for bad usage */
export async function main(programArguments: readonly string[]): Promise<number> {
  try {
    return await runTrials(programArguments);
  } catch (error) {
    if (!(error instanceof TrialUsageError)) throw error;
    process.stderr.write(`${error.message}\n\n${USAGE}\n`);
    return BAD_USAGE;
  }
}

async function runTrials(programArguments: readonly string[]): Promise<number> {
  const { seedCount, firstSeed, isHelp } = parseTrialArguments(programArguments);
  if (isHelp) {
    process.stdout.write(`${USAGE}\n`);
    return DONE;
  }
  const seeds = Array.from({ length: seedCount }, (_, index) => firstSeed + index);
  const results = [...MOTOR_CLASSES, ...MOTORLESS_CLASSES].flatMap((trialClass) => {
    process.stderr.write(`${trialClass.name}\n`);
    return seeds.map((seed) => runTrial(trialClass, seed));
  });
  const report = trialReport(results, { firstSeed, seedCount });
  const path = await writeReport(report);
  process.stdout.write(`${trialTables(report)}\n\nwritten to ${path}\n`);
  return DONE;
}

async function writeReport(report: TrialReport): Promise<string> {
  const folder = resolve(process.env.RIPPLEBENCH_DATA ?? '.data', 'trials');
  const path = join(folder, `${clock.now().toISOString().slice(0, DATE_LENGTH)}.json`);
  await mkdir(folder, { recursive: true });
  await writeFile(path, `${JSON.stringify(report, null, 1)}\n`);
  return path;
}
