import { resolve } from 'node:path';
import * as z from 'zod/mini';

/**
 * Every setting that the server and the worker read, validated once at start. The start script fills in what
 * the person did not set; nothing else in the project reads process.env.
 */
const flag = z.pipe(
  z._default(z.enum(['on', 'off']), 'off'),
  z.transform((value) => value === 'on'),
);
const folder = z.pipe(
  z._default(z.string(), '.data'),
  z.transform((path) => resolve(path)),
);
const port = z.coerce.number().check(z.int(), z.gte(1), z.lte(65_535));
const count = (minimum: number, maximum: number) => z.coerce.number().check(z.int(), z.gte(minimum), z.lte(maximum));

const settingsSchema = z.object({
  HOST: z._default(z.string(), '127.0.0.1'),
  PORT: z._default(port, 4321),
  RIPPLEBENCH_DATA: folder,
  RIPPLEBENCH_DATABASE_URL: z.string('RIPPLEBENCH_DATABASE_URL is missing; start with npm start, which sets it.'),
  RIPPLEBENCH_REDIS_URL: z.string('RIPPLEBENCH_REDIS_URL is missing; start with npm start, which sets it.'),
  /** The outside address when a proxy stands in front, e.g. https://bench.example. */
  RIPPLEBENCH_PUBLIC_URL: z.optional(z.url()),
  /** Whether X-Forwarded-For and X-Forwarded-Proto are believed. */
  RIPPLEBENCH_TRUST_PROXY: flag,
  RIPPLEBENCH_DEMO: flag,
  RIPPLEBENCH_LOG_LEVEL: z._default(z.enum(['debug', 'info', 'warn', 'error', 'silent']), 'info'),
  RIPPLEBENCH_ANALYSIS_THREADS: z._default(count(1, 64), 2),
  /** Uploads are refused when less than this is free on the data volume. */
  RIPPLEBENCH_MINIMUM_FREE_BYTES: z._default(count(0, Number.MAX_SAFE_INTEGER), 2_000_000_000),
  /** Length of a worker's claim on a recording. */
  RIPPLEBENCH_LEASE_SECONDS: z._default(count(2, 3600), 30),
});

const LOOPBACK_HOSTS: readonly string[] = ['127.0.0.1', '::1', 'localhost'];

/** @throws Error naming every setting that is wrong, and the rule that it breaks. */
export function parseSettings(environment: Readonly<Record<string, string | undefined>>) {
  const parsed = settingsSchema.safeParse(environment);
  if (!parsed.success) {
    const lines = parsed.error.issues.map((issue) => `${issue.path.join('.')}: ${issue.message}`);
    throw new Error(`The settings are not usable:\n${lines.join('\n')}`);
  }
  const values = parsed.data;
  if (values.RIPPLEBENCH_DEMO && !LOOPBACK_HOSTS.includes(values.HOST)) {
    throw new Error('RIPPLEBENCH_DEMO=on has well-known passwords: it is refused unless HOST is a loopback address.');
  }
  return {
    host: values.HOST,
    port: values.PORT,
    dataFolder: values.RIPPLEBENCH_DATA,
    databaseUrl: values.RIPPLEBENCH_DATABASE_URL,
    redisUrl: values.RIPPLEBENCH_REDIS_URL,
    publicUrl: values.RIPPLEBENCH_PUBLIC_URL ?? `http://${values.HOST}:${String(values.PORT)}`,
    trustsProxy: values.RIPPLEBENCH_TRUST_PROXY,
    hasDemo: values.RIPPLEBENCH_DEMO,
    logLevel: values.RIPPLEBENCH_LOG_LEVEL,
    analysisThreadCount: values.RIPPLEBENCH_ANALYSIS_THREADS,
    minimumFreeBytes: values.RIPPLEBENCH_MINIMUM_FREE_BYTES,
    leaseSeconds: values.RIPPLEBENCH_LEASE_SECONDS,
  } as const;
}

export type Settings = ReturnType<typeof parseSettings>;

let current: Settings | undefined;

/** The settings of this process; parsed on first use so that importing a module never fails. */
export function settings(): Settings {
  current ??= parseSettings(process.env);
  return current;
}
