import { Redis } from 'ioredis';
import { QueryTypes } from 'sequelize';
import { database } from '../database/connection.ts';
import { MIGRATIONS } from '../database/migrate.ts';
import { settings } from '../env.ts';
import { detectSandboxMode, type SandboxMode } from '../media/sandboxMode.ts';
import { countLiveWorkers } from '../models/workerHeartbeats.ts';
import { redisAddress } from '../queue/redisAddress.ts';
import { blobStorage } from '../storage/blobStorage.ts';

const CHECK_LIMIT_MILLISECONDS = 2000;
const WORKER_SILENCE_LIMIT_SECONDS = 15;

/** What has to work before anyone is sent here. */
const REQUIRED_CHECKS = {
  database: checkDatabase,
  schema: checkSchema,
  storage: checkStorage,
  worker: checkWorker,
} as const;

/** Whose absence only slows things down: without the doorbell the workers look for themselves. */
const HELPFUL_CHECKS = { redis: checkRedis } as const;

type CheckName = keyof typeof REQUIRED_CHECKS | keyof typeof HELPFUL_CHECKS;

export interface Readiness {
  readonly status: 'ready' | 'degraded' | 'not-ready';
  readonly checks: Readonly<Record<CheckName, 'ok' | 'failed'>>;
  /** How media tools are shut in. */
  readonly sandbox: SandboxMode;
}

let running: Promise<Readiness> | undefined;

/** Anyone may ask, so those who ask at the same time share one look. */
export function checkReadiness(): Promise<Readiness> {
  running ??= checkAll().finally(() => {
    running = undefined;
  });
  return running;
}

async function checkAll(): Promise<Readiness> {
  const checks = { ...REQUIRED_CHECKS, ...HELPFUL_CHECKS };
  const entries = await Promise.all(
    Object.entries(checks).map(async ([name, check]) => [name, (await passes(check)) ? 'ok' : 'failed'] as const),
  );
  const results = Object.fromEntries(entries) as Readiness['checks'];
  const isReady = Object.keys(REQUIRED_CHECKS).every((name) => results[name as CheckName] === 'ok');
  const isWhole = Object.values(results).every((result) => result === 'ok');
  const status = isReady ? (isWhole ? 'ready' : 'degraded') : 'not-ready';
  return { status, checks: results, sandbox: await detectSandboxMode() };
}

/** What is wrong stays in here: the answer is read by anyone. */
async function passes(check: () => Promise<boolean>): Promise<boolean> {
  let timer: NodeJS.Timeout | undefined;
  const limit = new Promise<boolean>((resolve) => {
    timer = setTimeout(resolve, CHECK_LIMIT_MILLISECONDS, false);
  });
  try {
    return await Promise.race([check(), limit]);
  } catch {
    return false;
  } finally {
    clearTimeout(timer);
  }
}

async function checkDatabase(): Promise<boolean> {
  await database.query('SELECT 1', { type: QueryTypes.SELECT });
  return true;
}

async function checkSchema(): Promise<boolean> {
  const rows = await database.query<{ name: string }>('SELECT name FROM schema_migrations', {
    type: QueryTypes.SELECT,
  });
  const done = new Set(rows.map(({ name }) => name));
  return MIGRATIONS.every(({ name }) => done.has(name));
}

async function checkStorage(): Promise<boolean> {
  const temporary = await blobStorage().createTemporary();
  try {
    await temporary.write(Buffer.alloc(1));
    return true;
  } finally {
    await temporary.discard();
  }
}

async function checkWorker(): Promise<boolean> {
  return (await countLiveWorkers(WORKER_SILENCE_LIMIT_SECONDS)) > 0;
}

async function checkRedis(): Promise<boolean> {
  const redis = new Redis({
    ...redisAddress(settings().redisUrl),
    lazyConnect: true,
    connectTimeout: CHECK_LIMIT_MILLISECONDS,
    maxRetriesPerRequest: 0,
    retryStrategy: () => null,
  });
  // The failure is told by `connect` as well; without a listener it would be printed.
  redis.on('error', () => undefined);
  try {
    await redis.connect();
    await redis.ping();
    return true;
  } finally {
    redis.disconnect();
  }
}
