import { accessSync, constants, existsSync, rmSync, writeFileSync } from 'node:fs';
import { delimiter, join } from 'node:path';
import { progress, SetupError } from './progress.mjs';
import { run } from './run.mjs';

/** Program → the Debian package that brings it. */
export const SERVER_PROGRAMS = {
  mariadbd: 'mariadb-server',
  'redis-server': 'redis-server',
  ffmpeg: 'ffmpeg',
  ffprobe: 'ffmpeg',
  bwrap: 'bubblewrap',
  prlimit: 'util-linux',
};
export const MEDIA_PROGRAMS = { ffmpeg: 'ffmpeg', ffprobe: 'ffmpeg', bwrap: 'bubblewrap', prlimit: 'util-linux' };
export const TEST_PROGRAMS = { ...SERVER_PROGRAMS, chromium: 'chromium', sox: 'sox' };
/** Needed by the tests but without a program of their own: AMR encoding, sox file formats. */
export const TEST_LIBRARIES = { '/usr/share/doc/libavcodec-extra59': 'libavcodec-extra59' };

const SYSTEM_FOLDERS = ['/usr/sbin', '/usr/local/sbin', '/sbin'];
const POLICY_FILE = '/usr/sbin/policy-rc.d';

/**
 * @param {string} program
 * @returns {string | null} its full path
 */
export function findProgram(program) {
  for (const folder of [...(process.env.PATH ?? '').split(delimiter), ...SYSTEM_FOLDERS]) {
    const path = join(folder, program);
    try {
      accessSync(path, constants.X_OK);
      return path;
    } catch {
      // not here; look in the next folder
    }
  }
  return null;
}

/**
 * Installs what is missing when that is allowed; otherwise names it and stops.
 * @param {Record<string, string>} programs
 * @param {Record<string, string>} [libraries] path that proves it → package
 */
export async function ensurePrograms(programs, libraries = {}) {
  const missing = [
    ...Object.entries(programs).filter(([program]) => findProgram(program) === null),
    ...Object.entries(libraries).filter(([path]) => !existsSync(path)),
  ];
  if (missing.length === 0) return;
  const packages = [...new Set(missing.map(([, name]) => name))];
  const canInstall = process.getuid?.() === 0 && findProgram('apt-get') !== null;
  if (!canInstall) {
    const lines = missing.map(([program, name]) => `  ${program}  (Debian package ${name})`);
    throw new SetupError(
      `These are missing:\n${lines.join('\n')}\nInstall them, for example: sudo apt-get install ${packages.join(' ')}`,
    );
  }
  progress(`installing ${packages.join(', ')} (several minutes on a new machine)`);
  const environment = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  // Debian starts a service that it installs; ours run in the project's own data folder instead.
  const mayPlacePolicy = !existsSync(POLICY_FILE);
  if (mayPlacePolicy) writeFileSync(POLICY_FILE, '#!/bin/sh\nexit 101\n', { mode: 0o755 });
  try {
    await run('apt-get', ['update', '-qq'], { quiet: true, env: environment });
    await run('apt-get', ['install', '-y', '-qq', '--no-install-recommends', ...packages], {
      quiet: true,
      env: environment,
    });
  } finally {
    if (mayPlacePolicy) rmSync(POLICY_FILE, { force: true });
  }
  const still = Object.keys(programs).filter((program) => findProgram(program) === null);
  if (still.length > 0) throw new SetupError(`Still missing after the installation: ${still.join(', ')}`);
}
