import { readFileSync } from 'node:fs';
import { availableParallelism } from 'node:os';
import { dirname, resolve } from 'node:path';
import { parseArgs } from 'node:util';
import * as z from 'zod/mini';
import type { AnalysisSettings } from '#lib/analysis/settings.ts';
import { eventsPerTurn, expectedOrders, shaftSpeedRpm } from '#lib/schemas/fields.ts';
import { resolveAnalysisSettings, type SettingsSource } from '#server/usecases/resolveAnalysisSettings.ts';

export const USAGE = `Usage: npm run --silent analyse -- [options] FILE…

  --events-per-turn K   sound events in one shaft turn, may be a fraction (default 1)
  --orders A,B…         strong sound orders to expect; the first is the events per turn
  --rpm-min A           slowest speed to consider, rpm (default 60)
  --rpm-max B           fastest speed to consider, rpm (default 60000)
  --list FILE           JSON Lines, one object a file: { "file", "eventsPerTurn", "rpmMin", "rpmMax", "orders" }
  --jobs N              files analysed at a time (default: cores)
  --json                one JSON object a line, in input order
  --help                this text`;

/** The person asked for something that cannot be done; the message says what. */
export class UsageError extends Error {
  override readonly name = 'UsageError';
}

/** One file to analyse. */
export interface FileToAnalyse {
  /** As it was given. */
  readonly file: string;
  readonly path: string;
  readonly settings: AnalysisSettings;
}

export interface AnalyseArguments {
  readonly files: readonly FileToAnalyse[];
  readonly jobCount: number;
  readonly isJson: boolean;
  readonly isHelp: boolean;
}

const OPTIONS = {
  'events-per-turn': { type: 'string' },
  orders: { type: 'string' },
  'rpm-min': { type: 'string' },
  'rpm-max': { type: 'string' },
  list: { type: 'string' },
  jobs: { type: 'string' },
  json: { type: 'boolean', default: false },
  help: { type: 'boolean', default: false },
} as const;

const JOB_MAXIMUM_COUNT = 64;
const JOBS_MESSAGE = `Must be a whole number from 1 to ${String(JOB_MAXIMUM_COUNT)}.`;
const PLAIN_NUMBER = /^\d*\.?\d+(?:e[+-]?\d+)?$/i;

const optionNumbers = z.object({
  'events-per-turn': z.optional(eventsPerTurn),
  orders: z.optional(expectedOrders),
  'rpm-min': z.optional(shaftSpeedRpm),
  'rpm-max': z.optional(shaftSpeedRpm),
  jobs: z.optional(z.int(JOBS_MESSAGE).check(z.gte(1, JOBS_MESSAGE), z.lte(JOB_MAXIMUM_COUNT, JOBS_MESSAGE))),
});
/** Further fields, such as the known speed, are passed over. */
const listEntry = z.object({
  file: z.string('Must be the path of a file.').check(z.minLength(1)),
  eventsPerTurn: z.optional(eventsPerTurn),
  orders: z.optional(expectedOrders),
  rpmMin: z.optional(shaftSpeedRpm),
  rpmMax: z.optional(shaftSpeedRpm),
});
type ListEntry = z.infer<typeof listEntry>;

/** @throws {UsageError} */
export function parseAnalyseArguments(programArguments: readonly string[]): AnalyseArguments {
  const { values, positionals } = parseOrRefuse(programArguments);
  const numbers = checked(
    optionNumbers,
    {
      'events-per-turn': numberOf(values['events-per-turn']),
      orders: values.orders?.split(',').map(numberOf),
      'rpm-min': numberOf(values['rpm-min']),
      'rpm-max': numberOf(values['rpm-max']),
      jobs: numberOf(values.jobs),
    },
    'The options',
  );
  const given = sourceOf({
    eventsPerTurn: numbers['events-per-turn'],
    orders: numbers.orders,
    rpmMin: numbers['rpm-min'],
    rpmMax: numbers['rpm-max'],
  });
  const listed = values.list === undefined ? [] : readList(values.list, given);
  const named = positionals.map((file) => ({ file, path: resolve(file), settings: settingsOf(file, [given]) }));
  const files = [...named, ...listed];
  if (files.length === 0 && !values.help) throw new UsageError('No file is given.');
  return { files, jobCount: numbers.jobs ?? availableParallelism(), isJson: values.json, isHelp: values.help };
}

function parseOrRefuse(programArguments: readonly string[]) {
  try {
    return parseArgs({ args: [...programArguments], options: OPTIONS, allowPositionals: true });
  } catch (error) {
    throw new UsageError(error instanceof Error ? error.message : String(error));
  }
}

/** Text that is no number becomes NaN, which every schema refuses with the range. */
function numberOf(text: string | undefined): number | undefined {
  if (text === undefined) return undefined;
  const trimmed = text.trim();
  return PLAIN_NUMBER.test(trimmed) ? Number(trimmed) : Number.NaN;
}

function checked<Schema extends z.ZodMiniType>(schema: Schema, value: unknown, where: string): z.infer<Schema> {
  const parsed = schema.safeParse(value);
  if (parsed.success) return parsed.data;
  const problems = parsed.error.issues.map(({ path, message }) => `${path.join('.')}: ${message}`);
  throw new UsageError(`${where} are not valid: ${problems.join(' ')}`);
}

function sourceOf({ eventsPerTurn, orders, rpmMin, rpmMax }: Omit<ListEntry, 'file'>): SettingsSource {
  return {
    eventsPerTurn: eventsPerTurn ?? null,
    orders: orders ?? null,
    minimumRpm: rpmMin ?? null,
    maximumRpm: rpmMax ?? null,
  };
}

/** @param given strongest source first */
function settingsOf(file: string, given: readonly [SettingsSource, SettingsSource?]): AnalysisSettings {
  for (const { minimumRpm, maximumRpm } of given.filter((source) => source !== undefined)) {
    if ((minimumRpm ?? 0) >= (maximumRpm ?? Number.POSITIVE_INFINITY)) {
      throw new UsageError(`The slowest speed must be below the fastest (${file}).`);
    }
  }
  const [recording, build] = given;
  return resolveAnalysisSettings({ recording, build: build ?? null, clockCorrectionPpm: null });
}

function readList(listFile: string, given: SettingsSource): FileToAnalyse[] {
  const folder = dirname(resolve(listFile));
  return readTextOrRefuse(listFile)
    .split('\n')
    .map((text, index) => ({ text: text.trim(), where: `The fields of line ${index + 1} of ${listFile}` }))
    .filter(({ text }) => text !== '')
    .map(({ text, where }) => {
      const { file, ...numbers } = checked(listEntry, parseJsonOrRefuse(text, where), where);
      return { file, path: resolve(folder, file), settings: settingsOf(file, [sourceOf(numbers), given]) };
    });
}

function readTextOrRefuse(file: string): string {
  try {
    return readFileSync(file, 'utf8').replace(/^\uFEFF/, '');
  } catch {
    throw new UsageError(`The list ${file} cannot be read.`);
  }
}

function parseJsonOrRefuse(text: string, where: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    throw new UsageError(`${where} are not valid: it is not JSON.`);
  }
}
