import { runProgram } from './setup/application.mjs';
import { buildNodePrograms } from './setup/build.mjs';
import { createInstance, instanceEnvironment } from './setup/instance.mjs';
import { ensurePackages } from './setup/packages.mjs';
import { ensurePrograms, MEDIA_PROGRAMS, SERVER_PROGRAMS, TEST_PROGRAMS } from './setup/programs.mjs';
import { stopProcesses } from './setup/processes.mjs';
import { runCommand, SetupError } from './setup/progress.mjs';
import { isListening, startServices } from './setup/services.mjs';

/** `npm run analyse | token | account | trials`: one program of ours, with what it needs set up first. */
const PROGRAMS = {
  analyse: { needs: MEDIA_PROGRAMS, usesDatabase: false },
  trials: { needs: TEST_PROGRAMS, usesDatabase: false },
  token: { needs: SERVER_PROGRAMS, usesDatabase: true },
  account: { needs: SERVER_PROGRAMS, usesDatabase: true },
};

/** Uses the servers of a running `npm start`, or starts them for as long as the program runs. */
async function withDatabase(instance, nodeFolder, body) {
  const isRunning = !instance.hasOwnDatabase || (await isListening(instance.databasePort));
  if (isRunning) return body();
  const services = await startServices({ ...instance, hasOwnRedis: false });
  try {
    const status = await runProgram({ nodeFolder, name: 'migrate', env: instanceEnvironment(instance) });
    if (status !== 0) throw new SetupError('The database could not be brought up to date.');
    return await body();
  } finally {
    await stopProcesses(services, 10);
  }
}

await runCommand(async () => {
  const [, , name, ...programArguments] = process.argv;
  const program = PROGRAMS[name];
  if (!program) throw new SetupError(`Usage: node scripts/run.mjs ${Object.keys(PROGRAMS).join('|')} [argument …]`);
  await ensurePrograms(program.needs);
  await ensurePackages();
  const nodeFolder = await buildNodePrograms();
  if (!program.usesDatabase) return runProgram({ nodeFolder, name, env: process.env, programArguments });
  const instance = createInstance();
  const env = instanceEnvironment(instance);
  return withDatabase(instance, nodeFolder, () => runProgram({ nodeFolder, name, env, programArguments }));
});
