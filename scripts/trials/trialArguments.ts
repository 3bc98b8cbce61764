import { parseArgs } from 'node:util';
import * as z from 'zod/mini';

export const USAGE = `Usage: npm run --silent trials -- [options]

  --seeds N         recordings of each class (default 12)
  --first-seed S    seed of the first of them (default 1000)
  --quick           two recordings of each class
  --help            this text`;

/** The person asked for something that cannot be done; the message says what. */
export class TrialUsageError extends Error {
  override readonly name = 'TrialUsageError';
}

export interface TrialArguments {
  readonly seedCount: number;
  readonly firstSeed: number;
  readonly isHelp: boolean;
}

const OPTIONS = {
  seeds: { type: 'string' },
  'first-seed': { type: 'string' },
  quick: { type: 'boolean', default: false },
  help: { type: 'boolean', default: false },
} as const;

const DEFAULT_SEED_COUNT = 12;
const QUICK_SEED_COUNT = 2;
const DEFAULT_FIRST_SEED = 1000;

const seedCount = z.coerce.number().check(z.int(), z.gte(1), z.lte(10_000));
const seed = z.coerce.number().check(z.int(), z.gte(0), z.lte(1_000_000_000));

/** @throws {TrialUsageError} */
export function parseTrialArguments(programArguments: readonly string[]): TrialArguments {
  const values = parseOrRefuse(programArguments);
  return {
    seedCount: checked(seedCount, values.seeds ?? (values.quick ? QUICK_SEED_COUNT : DEFAULT_SEED_COUNT), '--seeds'),
    firstSeed: checked(seed, values['first-seed'] ?? DEFAULT_FIRST_SEED, '--first-seed'),
    isHelp: values.help,
  };
}

function parseOrRefuse(programArguments: readonly string[]) {
  try {
    return parseArgs({ args: [...programArguments], options: OPTIONS }).values;
  } catch (error) {
    throw new TrialUsageError(error instanceof Error ? error.message : String(error));
  }
}

function checked(schema: z.ZodMiniType<number>, value: unknown, name: string): number {
  const parsed = schema.safeParse(value);
  if (parsed.success) return parsed.data;
  throw new TrialUsageError(`${name}: ${parsed.error.issues.map(({ message }) => message).join(' ')}`);
}
