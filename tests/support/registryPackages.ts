import { execa } from 'execa';
import { mkdir, mkdtemp, readdir, rename, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

/** Kept between runs, outside the project: what others recorded is never committed. */
const CACHE_FOLDER = join(tmpdir(), `ripplebench-registry-recordings-${String(process.getuid?.() ?? 0)}`);

/**
 * Unpacks a Debian package without installing it.
 *
 * @returns the folder that holds its files as they would lie below /
 * @throws when the package list cannot be fetched or names no such package
 */
export async function unpackDebianPackage(name: string): Promise<string> {
  const folder = join(CACHE_FOLDER, name);
  await mkdir(folder, { recursive: true });
  const archive = await findArchive(folder);
  if (archive === undefined) await download(name, folder);
  const root = join(folder, 'root');
  await execa('dpkg', ['-x', join(folder, archive ?? (await findArchive(folder)) ?? ''), root]);
  return root;
}

async function findArchive(folder: string): Promise<string | undefined> {
  return (await readdir(folder)).find((file) => file.endsWith('.deb'));
}

/** Downloads beside and renames: a download that was cut short must not look like a package. */
async function download(name: string, folder: string): Promise<void> {
  const unfinished = await mkdtemp(join(CACHE_FOLDER, 'unfinished-'));
  const get = () => execa('apt-get', ['download', '-qq', name], { cwd: unfinished });
  try {
    await get();
  } catch {
    // A machine that has never listed its packages knows none of them.
    await execa('apt-get', ['update', '-qq']);
    await get();
  }
  const archive = await findArchive(unfinished);
  if (archive === undefined) throw new Error(`apt-get download ${name} brought no package`);
  await rename(join(unfinished, archive), join(folder, archive));
  await rm(unfinished, { recursive: true });
}
