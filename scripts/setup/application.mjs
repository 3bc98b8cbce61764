import { join } from 'node:path';
import { buildNodePrograms, buildWeb, holdBuild, removeOldBuilds, sourceHash } from './build.mjs';
import { instanceEnvironment, PROJECT_FOLDER } from './instance.mjs';
import { startProcess, stopProcesses } from './processes.mjs';
import { progress, SetupError } from './progress.mjs';
import { run } from './run.mjs';
import { startServices } from './services.mjs';

const READY_LIMIT_SECONDS = 60;
/** Running uploads and the job in hand may finish; see src/server and scripts/serve.mjs. */
const STOP_GRACE_SECONDS = 35;
const INVOKE = join(PROJECT_FOLDER, 'scripts/setup/invoke.mjs');

/**
 * Runs one of the bundled programs to its end.
 * @param {{ nodeFolder: string, name: string, env: NodeJS.ProcessEnv, programArguments?: string[] }} options
 */
export async function runProgram({ nodeFolder, name, env, programArguments = [] }) {
  return run(process.execPath, [INVOKE, join(nodeFolder, `scripts/${name}.mjs`), ...programArguments], {
    cwd: PROJECT_FOLDER,
    env,
  });
}

async function prepareDatabase(nodeFolder, env) {
  for (const name of ['migrate', 'seed']) {
    const status = await runProgram({ nodeFolder, name, env });
    if (status !== 0) throw new SetupError(`The database could not be prepared (${name} ended with ${status}).`);
  }
}

async function waitUntilReady(url, processes) {
  const until = performance.now() + READY_LIMIT_SECONDS * 1000;
  while (performance.now() < until) {
    const gone = processes.find(({ child }) => child.exitCode !== null || child.signalCode !== null);
    if (gone) throw new SetupError(`The ${gone.name} stopped while it was starting; its last lines stand above.`);
    const isReady = await fetch(`${url}/readyz`).then(
      (response) => response.ok,
      () => false,
    );
    if (isReady) return;
    await new Promise((done) => setTimeout(done, 100));
  }
  throw new SetupError(`The web server was not ready within ${READY_LIMIT_SECONDS} s.`);
}

/**
 * Brings up everything: servers, build, schema, demo, web and worker.
 * @param {import('./instance.mjs').Instance} instance
 * @param {{ logTo?: 'inherit' | number }} [options] where web and worker write
 */
export async function startApplication(instance, { logTo = 'inherit' } = {}) {
  const hash = sourceHash();
  const env = instanceEnvironment(instance);
  const started = [];
  const stop = async () => {
    await stopProcesses([...started].reverse(), STOP_GRACE_SECONDS);
    release();
  };
  const release = holdBuild(hash);
  try {
    const [services, builds] = await Promise.allSettled([
      startServices(instance),
      (async () => ({ nodeFolder: await buildNodePrograms(hash), webFolder: await buildWeb(hash) }))(),
    ]);
    if (services.status === 'fulfilled') started.push(...services.value);
    if (services.status === 'rejected') throw services.reason;
    if (builds.status === 'rejected') throw builds.reason;
    const { nodeFolder, webFolder } = builds.value;
    removeOldBuilds();
    progress('preparing the database');
    await prepareDatabase(nodeFolder, env);
    progress('starting web and worker');
    const options = { cwd: PROJECT_FOLDER, env, stdio: ['ignore', logTo, logTo] };
    const worker = startProcess('worker', [join(nodeFolder, 'worker/index.mjs')], options);
    const web = startProcess('web server', [join(PROJECT_FOLDER, 'scripts/serve.mjs'), webFolder], options);
    started.push(worker, web);
    const url = `http://${instance.host.includes(':') ? `[${instance.host}]` : instance.host}:${instance.port}`;
    await waitUntilReady(url, started);
    return { url, env, nodeFolder, processes: started, stop };
  } catch (error) {
    await stop();
    throw error;
  }
}
