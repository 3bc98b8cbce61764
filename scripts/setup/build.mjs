import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, readFileSync, renameSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { join, relative } from 'node:path';
import { progress } from './progress.mjs';
import { PROJECT_FOLDER } from './instance.mjs';
import { run } from './run.mjs';

const BUILDS_FOLDER = join(PROJECT_FOLDER, 'dist');
const SOURCES = [
  'src',
  'worker',
  'scripts',
  'public',
  'astro.config.mjs',
  'package.json',
  'package-lock.json',
  'tsconfig.json',
];
const KEPT_BUILD_COUNT = 3;

/** Entry of the bundle → source; the worker finds its thread beside itself. */
const NODE_ENTRIES = {
  'worker/index': 'worker/index.ts',
  'worker/threads/analyse': 'worker/threads/analyse.ts',
  'scripts/migrate': 'scripts/migrate.ts',
  'scripts/seed': 'scripts/seed.ts',
  'scripts/analyse': 'scripts/analyse.ts',
  'scripts/token': 'scripts/token.ts',
  'scripts/account': 'scripts/account.ts',
  'scripts/trials': 'scripts/trials.ts',
};

function* filesBelow(path) {
  if (!existsSync(path)) return;
  if (statSync(path).isFile()) {
    yield path;
    return;
  }
  for (const entry of readdirSync(path).sort()) yield* filesBelow(join(path, entry));
}

/**
 * @param {string} [projectFolder]
 * @returns {string} a name for the present sources; any changed byte or moved file changes it
 */
export function sourceHash(projectFolder = PROJECT_FOLDER) {
  const hash = createHash('sha256').update(process.version);
  for (const source of SOURCES) {
    for (const file of filesBelow(join(projectFolder, source))) {
      hash.update(`\0${relative(projectFolder, file)}\0`).update(readFileSync(file));
    }
  }
  return hash.digest('hex').slice(0, 16);
}

/** Builds into a folder beside the final one, so that a build that is named is whole. */
async function buildOnce(folder, part, build) {
  const target = join(folder, part);
  if (existsSync(target)) return target;
  const unfinished = join(folder, `${part}.unfinished-${process.pid}`);
  mkdirSync(folder, { recursive: true });
  await build(unfinished);
  try {
    renameSync(unfinished, target);
  } catch (error) {
    // Another process has finished the same build first.
    rmSync(unfinished, { recursive: true, force: true });
    if (!existsSync(target)) throw error;
  }
  return target;
}

/** @returns {Promise<string>} folder of the worker and the command-line programs */
export async function buildNodePrograms(hash = sourceHash()) {
  return buildOnce(join(BUILDS_FOLDER, hash), 'node', async (outdir) => {
    const { build } = await import('esbuild');
    const entries = Object.entries(NODE_ENTRIES).filter(([, source]) => existsSync(join(PROJECT_FOLDER, source)));
    await build({
      absWorkingDir: PROJECT_FOLDER,
      entryPoints: Object.fromEntries(entries),
      outdir,
      outExtension: { '.js': '.mjs' },
      bundle: true,
      platform: 'node',
      format: 'esm',
      target: 'node20',
      packages: 'external',
      sourcemap: 'linked',
      logLevel: 'warning',
    });
  });
}

/** @returns {Promise<string>} folder of the web application */
export async function buildWeb(hash = sourceHash()) {
  return buildOnce(join(BUILDS_FOLDER, hash), 'web', async (outdir) => {
    progress('building the pages (half a minute or so)');
    await run(process.execPath, [join(PROJECT_FOLDER, 'node_modules/astro/astro.js'), 'build'], {
      cwd: PROJECT_FOLDER,
      quiet: true,
      env: { ...process.env, NODE_ENV: 'production', ASTRO_TELEMETRY_DISABLED: '1', RIPPLEBENCH_WEB_OUT: outdir },
    });
  });
}

function isAlive(processId) {
  try {
    process.kill(processId, 0);
    return true;
  } catch {
    return false;
  }
}

/** Marks a build as in use by this process, so that no later start removes it. */
export function holdBuild(hash) {
  const folder = join(BUILDS_FOLDER, hash, 'users');
  mkdirSync(folder, { recursive: true });
  const file = join(folder, String(process.pid));
  writeFileSync(file, '');
  return () => rmSync(file, { force: true });
}

/** Removes old builds that no running process holds; the newest few stay. */
export function removeOldBuilds() {
  const builds = readdirSync(BUILDS_FOLDER)
    .map((name) => ({ path: join(BUILDS_FOLDER, name), changed: statSync(join(BUILDS_FOLDER, name)).mtimeMs }))
    .sort((a, b) => b.changed - a.changed);
  for (const { path } of builds.slice(KEPT_BUILD_COUNT)) {
    const users = existsSync(join(path, 'users')) ? readdirSync(join(path, 'users')) : [];
    if (!users.some((user) => isAlive(Number(user)))) rmSync(path, { recursive: true, force: true });
  }
}
