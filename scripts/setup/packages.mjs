import { createHash } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { progress, SetupError } from './progress.mjs';
import { PROJECT_FOLDER } from './instance.mjs';
import { run } from './run.mjs';

const NODE_MAJOR = 20;
const STAMP = join(PROJECT_FOLDER, 'node_modules', '.ripplebench-lock');

/** Makes node_modules equal to the lock file; does nothing when it is already. */
export async function ensurePackages() {
  const major = Number(process.versions.node.split('.')[0]);
  if (major !== NODE_MAJOR) {
    throw new SetupError(`Node ${NODE_MAJOR} is needed; this is ${process.version}.`);
  }
  const lockHash = createHash('sha256')
    .update(readFileSync(join(PROJECT_FOLDER, 'package-lock.json')))
    .digest('hex');
  if (existsSync(STAMP) && readFileSync(STAMP, 'utf8') === lockHash) return;
  progress('installing the npm packages (one to several minutes)');
  await run('npm', ['ci', '--no-audit', '--no-fund', '--loglevel=error'], { cwd: PROJECT_FOLDER, quiet: true });
  writeFileSync(STAMP, lockHash);
}
