import { join } from 'node:path';
import { PROJECT_FOLDER } from './setup/instance.mjs';
import { ensurePackages } from './setup/packages.mjs';
import { progress, runCommand } from './setup/progress.mjs';
import { run } from './setup/run.mjs';

/** `npm run check`: types, lint, format, module boundaries, unused code. All are run; any failure fails the command. */
const bin = (name) => join(PROJECT_FOLDER, 'node_modules/.bin', name);

const CHECKS = {
  types: [bin('astro'), ['check', '--minimumFailingSeverity', 'warning', '--tsconfig', 'tsconfig.json']],
  'types of src/lib without DOM and Node': [bin('tsc'), ['--noEmit', '--project', 'tests/tsconfig.lib.json']],
  lint: [bin('eslint'), ['--config', 'scripts/eslint.config.mjs', '--max-warnings', '0', '.']],
  format: [bin('prettier'), ['--config', 'scripts/prettier.config.mjs', '--log-level', 'warn', '--check', '.']],
  'module boundaries': [
    bin('depcruise'),
    ['--config', 'scripts/boundaries.cjs', '--output-type', 'err', 'src', 'worker', 'scripts'],
  ],
  'unused code': [bin('knip'), ['--config', 'scripts/knip.json']],
};

await runCommand(async () => {
  await ensurePackages();
  const failures = [];
  const env = { ...process.env, ASTRO_TELEMETRY_DISABLED: '1' };
  for (const [name, [program, programArguments]] of Object.entries(CHECKS)) {
    progress(`check: ${name}`);
    if ((await run(program, programArguments, { cwd: PROJECT_FOLDER, env })) !== 0) failures.push(name);
  }
  progress(failures.length === 0 ? 'check: all good' : `check: failed: ${failures.join(', ')}`);
  return failures.length === 0 ? 0 : 1;
});
