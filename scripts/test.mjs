import { mkdirSync, openSync, readFileSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { startApplication } from './setup/application.mjs';
import { createInstance, freePort, PROJECT_FOLDER } from './setup/instance.mjs';
import { ensurePackages } from './setup/packages.mjs';
import { ensurePrograms, TEST_LIBRARIES, TEST_PROGRAMS } from './setup/programs.mjs';
import { progress, runCommand } from './setup/progress.mjs';
import { run } from './setup/run.mjs';

/**
 * `npm test`: the same set-up as `npm start`, on ports and a data folder of its own, then every test.
 * `npm test -- unit` (or integration, e2e) runs one kind; further arguments go to the test runner.
 */
const KINDS = ['unit', 'integration', 'e2e'];
const LAST_LOG_LINE_COUNT = 40;

/** @returns {Promise<{ passed: number, failed: number }>} */
async function runTests(kind, env, runnerArguments) {
  const report = join(env.RIPPLEBENCH_DATA, `${kind}.json`);
  progress(`${kind} tests`);
  const status = await run(
    process.execPath,
    [
      join(PROJECT_FOLDER, 'node_modules/vitest/vitest.mjs'),
      'run',
      `--config=tests/vitest.${kind}.config.ts`,
      '--reporter=default',
      '--reporter=json',
      `--outputFile.json=${report}`,
      ...runnerArguments,
    ],
    { cwd: PROJECT_FOLDER, env: { ...env, NODE_ENV: 'test' } },
  );
  const { numPassedTests, numFailedTests } = JSON.parse(readFileSync(report, 'utf8'));
  // A file that cannot even be loaded has no failed test of its own.
  return { passed: numPassedTests, failed: status === 0 ? numFailedTests : Math.max(1, numFailedTests) };
}

await runCommand(async () => {
  const [firstArgument] = process.argv.slice(2);
  const isOneKind = KINDS.includes(firstArgument);
  const kinds = isOneKind ? [firstArgument] : KINDS;
  const runnerArguments = process.argv.slice(isOneKind ? 3 : 2);

  await ensurePrograms(TEST_PROGRAMS, TEST_LIBRARIES);
  await ensurePackages();
  const dataFolder = join(PROJECT_FOLDER, `.data-test-${process.pid}`);
  mkdirSync(dataFolder, { recursive: true });
  const [port, databasePort, redisPort] = await Promise.all([freePort(), freePort(), freePort()]);
  const instance = createInstance({
    HOST: '127.0.0.1',
    PORT: String(port),
    RIPPLEBENCH_DATA: dataFolder,
    RIPPLEBENCH_DB_PORT: String(databasePort),
    RIPPLEBENCH_REDIS_PORT: String(redisPort),
  });
  const log = join(dataFolder, 'application.log');
  let application;
  let failed = 1;
  try {
    application = await startApplication(instance, { logTo: openSync(log, 'a') });
    for (const signal of ['SIGINT', 'SIGTERM']) process.once(signal, () => void application.stop());
    const env = {
      ...application.env,
      RIPPLEBENCH_TEST_URL: application.url,
      RIPPLEBENCH_TEST_BUILD: application.nodeFolder,
    };
    const counts = { passed: 0, failed: 0 };
    for (const kind of kinds) {
      const result = await runTests(kind, env, runnerArguments);
      counts.passed += result.passed;
      counts.failed += result.failed;
    }
    progress('stopping');
    await application.stop();
    failed = counts.failed;
    process.stdout.write(`${counts.passed} passed, ${counts.failed} failed\n`);
  } finally {
    await application?.stop();
    if (failed > 0) {
      const lines = readFileSync(log, 'utf8').trimEnd().split('\n').slice(-LAST_LOG_LINE_COUNT);
      process.stderr.write(`Last lines of web and worker (all in ${log}):\n${lines.join('\n')}\n`);
    } else {
      rmSync(dataFolder, { recursive: true, force: true });
      if (instance.serverFolder !== dataFolder) rmSync(instance.serverFolder, { recursive: true, force: true });
    }
  }
  return failed > 0 ? 1 : 0;
});
