import { watch } from 'node:fs';
import { join } from 'node:path';
import { runProgram } from './setup/application.mjs';
import { buildNodePrograms } from './setup/build.mjs';
import { createInstance, instanceEnvironment, PROJECT_FOLDER } from './setup/instance.mjs';
import { ensurePackages } from './setup/packages.mjs';
import { startProcess, stopProcesses } from './setup/processes.mjs';
import { ensurePrograms, SERVER_PROGRAMS } from './setup/programs.mjs';
import { progress, runCommand } from './setup/progress.mjs';
import { startServices } from './setup/services.mjs';

/** `npm run dev`: servers, Astro's development server, and a worker that is rebuilt when its sources change. */
const STOP_GRACE_SECONDS = 10;
const SETTLE_MILLISECONDS = 200;
const WORKER_SOURCES = ['worker', 'src/server', 'src/lib'];

await runCommand(async () => {
  const askedToStop = new Promise((resolve) => {
    for (const signal of ['SIGINT', 'SIGTERM']) process.once(signal, resolve);
  });
  await ensurePrograms(SERVER_PROGRAMS);
  await ensurePackages();
  const instance = createInstance();
  const env = { ...instanceEnvironment(instance), NODE_ENV: 'development' };
  const services = await startServices(instance);
  const options = { cwd: PROJECT_FOLDER, env };

  let worker = null;
  const restartWorker = async () => {
    const nodeFolder = await buildNodePrograms();
    if (worker) await stopProcesses([worker], STOP_GRACE_SECONDS);
    else for (const name of ['migrate', 'seed']) await runProgram({ nodeFolder, name, env });
    worker = startProcess('worker', [join(nodeFolder, 'worker/index.mjs')], options);
  };
  await restartWorker();
  const astro = join(PROJECT_FOLDER, 'node_modules/astro/astro.js');
  const web = startProcess(
    'web server',
    [astro, 'dev', '--host', instance.host, '--port', String(instance.port)],
    options,
  );

  let timer;
  const watchers = WORKER_SOURCES.map((folder) =>
    watch(join(PROJECT_FOLDER, folder), { recursive: true }, () => {
      clearTimeout(timer);
      timer = setTimeout(() => {
        restartWorker().catch((error) => progress(`the worker cannot be built: ${error.message}`));
      }, SETTLE_MILLISECONDS);
    }),
  );
  await askedToStop;
  for (const watcher of watchers) watcher.close();
  await stopProcesses([web, ...(worker ? [worker] : []), ...services.reverse()], STOP_GRACE_SECONDS);
});
