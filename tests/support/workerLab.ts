/**
 * A bench of our own for trying to break the worker: a database, a Redis and a data folder that nobody else uses,
 * and as many real worker processes as a test wants to start, stop and kill.
 *
 * Modules of the server read their settings when they are first imported, so a test opens the lab before it imports
 * any of them.
 */
import { type ChildProcess, spawn } from 'node:child_process';
import { randomBytes } from 'node:crypto';
import { once } from 'node:events';
import { mkdtempSync, rmSync } from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import mariadb from 'mariadb';

const POLL_MILLISECONDS = 20;
/** A busy machine starts a Node process and its threads in a few seconds. */
const DEADLINE_SECONDS = 30;

/** Waits for something to come true. @throws Error naming it when it does not within the time */
export async function until<Value>(
  what: string,
  look: () => Promise<Value | null | false> | Value | null | false,
  deadlineSeconds = DEADLINE_SECONDS,
): Promise<Value> {
  const end = performance.now() + deadlineSeconds * 1000;
  for (;;) {
    const value = await look();
    if (value !== null && value !== false) return value;
    if (performance.now() > end) throw new Error(`Not within ${String(deadlineSeconds)} s: ${what}`);
    await pause(POLL_MILLISECONDS);
  }
}

/** One real process of ours. */
export class LabProcess {
  readonly child: ChildProcess;
  #output = '';

  constructor(program: string, programArguments: readonly string[], env: NodeJS.ProcessEnv) {
    this.child = spawn(program, programArguments, { env, stdio: ['ignore', 'pipe', 'pipe'] });
    for (const stream of [this.child.stdout, this.child.stderr]) {
      stream?.on('data', (chunk: Buffer) => (this.#output += chunk.toString()));
    }
  }

  get output(): string {
    return this.#output;
  }

  get hasEnded(): boolean {
    return this.child.exitCode !== null || this.child.signalCode !== null;
  }

  /** Waits until the process has written this. */
  async says(text: string): Promise<void> {
    await until(`"${text}" in the output:\n${this.#output}`, () => this.#output.includes(text) || this.#failIfEnded());
  }

  /** @returns the exit status; null when it died by the signal */
  async end(signal: NodeJS.Signals): Promise<number | null> {
    if (!this.hasEnded) {
      const exit = once(this.child, 'exit');
      this.child.kill(signal);
      // A stopped process takes other signals only when it goes on.
      this.child.kill('SIGCONT');
      await exit;
    }
    return this.child.exitCode;
  }

  #failIfEnded(): false {
    if (this.hasEnded) throw new Error(`The process has ended:\n${this.#output}`);
    return false;
  }
}

interface WorkerOptions {
  readonly threadCount?: number;
  readonly leaseSeconds?: number;
}

export class WorkerLab {
  readonly #databaseName: string;
  readonly #adminUrl: URL;
  readonly #redisPort: number;
  readonly #processes: LabProcess[] = [];
  #redis: LabProcess | null = null;

  constructor(options: { databaseName: string; adminUrl: URL; redisPort: number }) {
    this.#databaseName = options.databaseName;
    this.#adminUrl = options.adminUrl;
    this.#redisPort = options.redisPort;
  }

  get redisUrl(): string {
    return `redis://127.0.0.1:${String(this.#redisPort)}/0`;
  }

  get redis(): LabProcess {
    if (this.#redis === null) throw new Error('The Redis of the lab is stopped.');
    return this.#redis;
  }

  async startRedis(): Promise<void> {
    const programArguments = ['--port', String(this.#redisPort), '--bind', '127.0.0.1', '--save', ''];
    this.#redis = this.#start('redis-server', [...programArguments, '--maxmemory-policy', 'noeviction'], process.env);
    await this.#redis.says('Ready to accept connections');
  }

  async stopRedis(): Promise<void> {
    await this.#redis?.end('SIGKILL');
    this.#redis = null;
  }

  /** Starts the built worker and waits until it claims. */
  async startWorker({ threadCount = 1, leaseSeconds = 3 }: WorkerOptions = {}): Promise<LabProcess> {
    const entry = join(process.env.RIPPLEBENCH_TEST_BUILD ?? '', 'worker/index.mjs');
    const worker = this.#start(process.execPath, ['--enable-source-maps', entry], {
      ...process.env,
      RIPPLEBENCH_LOG_LEVEL: 'info',
      RIPPLEBENCH_ANALYSIS_THREADS: String(threadCount),
      RIPPLEBENCH_LEASE_SECONDS: String(leaseSeconds),
    });
    await worker.says('the worker has started');
    return worker;
  }

  /** Ends every worker, so that the next test begins with none. */
  async endWorkers(): Promise<void> {
    const workers = this.#processes.filter((labProcess) => labProcess !== this.#redis);
    await Promise.all(workers.map((worker) => worker.end('SIGKILL')));
  }

  async close(): Promise<void> {
    await Promise.all(this.#processes.map((labProcess) => labProcess.end('SIGKILL')));
    const [{ database }, { closeBell }] = await Promise.all([
      import('#server/database/connection.ts'),
      import('#server/queue/ringWorkers.ts'),
    ]);
    closeBell();
    await database.close();
    await this.runAsAdmin(`DROP DATABASE IF EXISTS ${this.#databaseName}`);
    rmSync(process.env.RIPPLEBENCH_DATA ?? '', { recursive: true, force: true });
  }

  async runAsAdmin(sql: string): Promise<void> {
    const { hostname, port, username, password } = this.#adminUrl;
    const connection = await mariadb.createConnection({
      host: hostname,
      port: Number(port),
      user: decodeURIComponent(username),
      password: decodeURIComponent(password),
    });
    await connection.query(sql);
    await connection.end();
  }

  #start(program: string, programArguments: readonly string[], env: NodeJS.ProcessEnv): LabProcess {
    const labProcess = new LabProcess(program, programArguments, env);
    this.#processes.push(labProcess);
    return labProcess;
  }
}

async function freePort(): Promise<number> {
  const server = createServer().listen(0, '127.0.0.1');
  await once(server, 'listening');
  const address = server.address();
  server.close();
  if (address === null || typeof address === 'string') throw new Error('freePort: no port');
  return address.port;
}

/** Opens a lab with an empty migrated database and a running Redis, and points the settings of this process at it. */
export async function openWorkerLab(): Promise<WorkerLab> {
  const databaseName = `ripplebench_lab_${randomBytes(6).toString('hex')}`;
  const adminUrl = new URL(process.env.RIPPLEBENCH_DATABASE_URL ?? '');
  const lab = new WorkerLab({ databaseName, adminUrl, redisPort: await freePort() });
  await lab.runAsAdmin(`CREATE DATABASE ${databaseName} CHARACTER SET utf8mb4`);
  const databaseUrl = new URL(adminUrl);
  databaseUrl.pathname = `/${databaseName}`;
  process.env.RIPPLEBENCH_DATABASE_URL = databaseUrl.href;
  process.env.RIPPLEBENCH_REDIS_URL = lab.redisUrl;
  process.env.RIPPLEBENCH_DATA = mkdtempSync(join(tmpdir(), 'ripplebench-lab-'));
  process.env.RIPPLEBENCH_MINIMUM_FREE_BYTES = '0';
  process.env.RIPPLEBENCH_LOG_LEVEL = 'silent';
  await lab.startRedis();
  const { migrate } = await import('#server/database/migrate.ts');
  await migrate();
  return lab;
}
