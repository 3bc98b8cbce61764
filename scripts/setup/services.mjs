import { spawn } from 'node:child_process';
import { chmodSync, chownSync, closeSync, existsSync, mkdirSync, openSync, readFileSync, writeFileSync } from 'node:fs';
import { connect } from 'node:net';
import { dirname, join } from 'node:path';
import { progress, SetupError } from './progress.mjs';
import { findProgram } from './programs.mjs';
import { run } from './run.mjs';

const START_LIMIT_SECONDS = 120;
const LAST_LOG_LINE_COUNT = 15;
const isRoot = process.getuid?.() === 0;

/** uid and gid of a system user, or null */
function systemUser(name) {
  const line = readFileSync('/etc/passwd', 'utf8')
    .split('\n')
    .find((entry) => entry.startsWith(`${name}:`));
  const [, , uid, gid] = line?.split(':') ?? [];
  return uid === undefined ? null : { uid: Number(uid), gid: Number(gid) };
}

/** A folder that belongs to the service's own user when we are root. */
function serviceFolder(path, userName) {
  // Whatever the umask says, the service's user must be able to walk in.
  if (!existsSync(dirname(path))) {
    mkdirSync(dirname(path), { recursive: true });
    chmodSync(dirname(path), 0o755);
  }
  mkdirSync(path, { recursive: true, mode: 0o750 });
  const user = isRoot ? systemUser(userName) : null;
  if (user) chownSync(path, user.uid, user.gid);
  return { path, user };
}

/** @returns {Promise<boolean>} whether something listens on the port */
export function isListening(port) {
  return new Promise((resolve) => {
    const socket = connect({ host: '127.0.0.1', port });
    socket.once('connect', () => resolve(socket.destroy() && true));
    socket.once('error', () => resolve(false));
  });
}

/** Waits for the server's own word: it may listen before it can serve, and must not be stopped before then. */
async function waitUntilReady(service) {
  const until = performance.now() + START_LIMIT_SECONDS * 1000;
  const newLines = () => readFileSync(service.log, 'utf8').slice(service.logStart);
  while (performance.now() < until) {
    if (service.child.exitCode !== null || service.child.signalCode !== null) break;
    if (service.readyLine.test(newLines())) return;
    await new Promise((done) => setTimeout(done, 50));
  }
  const lines = newLines().trimEnd().split('\n').slice(-LAST_LOG_LINE_COUNT);
  throw new SetupError(`${service.name} did not start on port ${service.port}. Its last words:\n${lines.join('\n')}`);
}

/** Starts a server in a process group of its own, so that Ctrl-C reaches it only through us, in order. */
async function startService({ name, port, program, programArguments, log, readyLine, user }) {
  if (await isListening(port)) {
    throw new SetupError(`Port ${port} for ${name} is taken. Stop what uses it, or set another port (see README.md).`);
  }
  const logStart = existsSync(log) ? readFileSync(log, 'utf8').length : 0;
  const start = () => {
    const output = openSync(log, 'a');
    try {
      return spawn(program, programArguments, {
        stdio: ['ignore', output, output],
        detached: true,
        ...(user ?? {}),
      });
    } finally {
      closeSync(output);
    }
  };
  const service = { name, port, child: start(), start, log, logStart, readyLine };
  await waitUntilReady(service);
  return service;
}

/** @param {import('./instance.mjs').Instance} instance */
async function startMariadb({ serverFolder, dataFolder, databasePort, secrets }) {
  const { path, user } = serviceFolder(join(serverFolder, 'mariadb'), 'mysql');
  const userArguments = user ? ['--user=mysql'] : [];
  if (!existsSync(join(path, 'mysql'))) {
    progress('making the database folder');
    await run(
      findProgram('mariadb-install-db') ?? 'mariadb-install-db',
      ['--no-defaults', `--datadir=${path}`, '--skip-test-db', ...userArguments],
      { quiet: true },
    );
  }
  const initFile = join(path, 'ripplebench-init.sql');
  writeFileSync(
    initFile,
    [
      'CREATE DATABASE IF NOT EXISTS ripplebench CHARACTER SET utf8mb4;',
      `CREATE USER IF NOT EXISTS 'ripplebench'@'127.0.0.1' IDENTIFIED BY '${secrets.databasePassword}';`,
      `ALTER USER 'ripplebench'@'127.0.0.1' IDENTIFIED BY '${secrets.databasePassword}';`,
      "GRANT ALL ON ripplebench.* TO 'ripplebench'@'127.0.0.1';",
      // Tests of the worker make databases of their own, so that no other worker takes their recordings.
      "GRANT ALL ON `ripplebench\\_lab\\_%`.* TO 'ripplebench'@'127.0.0.1';",
      '',
    ].join('\n'),
    { mode: 0o640 },
  );
  if (user) chownSync(initFile, user.uid, user.gid);
  return startService({
    name: 'MariaDB',
    port: databasePort,
    program: /** @type {string} */ (findProgram('mariadbd')),
    log: join(dataFolder, 'mariadb.log'),
    readyLine: /ready for connections/,
    user: null,
    programArguments: [
      '--no-defaults',
      ...userArguments,
      `--datadir=${path}`,
      `--port=${databasePort}`,
      '--bind-address=127.0.0.1',
      // Relative to the data folder: a socket path may hold 107 characters at most.
      '--socket=mariadb.sock',
      `--init-file=${initFile}`,
      '--skip-name-resolve',
      '--character-set-server=utf8mb4',
      '--max-allowed-packet=64M',
      '--innodb-flush-log-at-trx-commit=1',
      '--innodb-buffer-pool-size=256M',
    ],
  });
}

/** @param {import('./instance.mjs').Instance} instance */
async function startRedis({ serverFolder, dataFolder, redisPort, secrets }) {
  const { path, user } = serviceFolder(join(serverFolder, 'redis'), 'redis');
  const configuration = join(path, 'redis.conf');
  writeFileSync(
    configuration,
    [
      `port ${redisPort}`,
      'bind 127.0.0.1',
      `requirepass ${secrets.redisPassword}`,
      `dir ${JSON.stringify(path)}`,
      'appendonly yes',
      'save ""',
      'maxmemory 256mb',
      'maxmemory-policy noeviction',
      '',
    ].join('\n'),
    { mode: 0o640 },
  );
  if (user) chownSync(configuration, user.uid, user.gid);
  return startService({
    name: 'Redis',
    port: redisPort,
    program: /** @type {string} */ (findProgram('redis-server')),
    log: join(dataFolder, 'redis.log'),
    readyLine: /Ready to accept connections/,
    user,
    programArguments: [configuration],
  });
}

/**
 * Starts the servers that this instance does not borrow.
 * @param {import('./instance.mjs').Instance} instance
 * @returns the started services, to be stopped with `stopProcesses`
 */
export async function startServices(instance) {
  progress('starting MariaDB and Redis');
  const starts = [];
  if (instance.hasOwnDatabase) starts.push(startMariadb(instance));
  if (instance.hasOwnRedis) starts.push(startRedis(instance));
  const results = await Promise.allSettled(starts);
  const services = results.flatMap((result) => (result.status === 'fulfilled' ? [result.value] : []));
  const failure = results.find((result) => result.status === 'rejected');
  if (failure) {
    for (const { child } of services) child.kill('SIGTERM');
    throw failure.reason;
  }
  return services;
}
