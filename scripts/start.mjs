import { startApplication } from './setup/application.mjs';
import { createInstance } from './setup/instance.mjs';
import { ensurePackages } from './setup/packages.mjs';
import { ensurePrograms, SERVER_PROGRAMS } from './setup/programs.mjs';
import { progress, runCommand, SetupError } from './setup/progress.mjs';
import { supervise } from './setup/supervise.mjs';

/** `npm start`: from a machine with Node and npm only to a running Ripplebench, and back to nothing on Ctrl-C. */
const LOOPBACK_HOSTS = ['127.0.0.1', '::1', 'localhost'];

function refuseDemoInPublic({ demo, host }) {
  if (demo === 'on' && !LOOPBACK_HOSTS.includes(host)) {
    throw new SetupError(
      'RIPPLEBENCH_DEMO=on has well-known passwords: it is refused unless HOST is a loopback address.',
    );
  }
}

await runCommand(async () => {
  let askToStop = () => {};
  const askedToStop = new Promise((resolve) => {
    askToStop = resolve;
  });
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => askToStop(signal));

  const instance = createInstance();
  refuseDemoInPublic(instance);
  await ensurePrograms(SERVER_PROGRAMS);
  await ensurePackages();
  const application = await startApplication(instance);
  process.stdout.write(`Ripplebench is ready at ${application.url}\n`);

  const leaves = application.processes.map((running) => supervise(running));
  progress(`stopping (${await askedToStop})`);
  for (const leave of leaves) leave();
  await application.stop();
  progress('stopped');
});
