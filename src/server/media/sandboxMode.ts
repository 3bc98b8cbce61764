import { execFile } from 'node:child_process';
import { lstat, readlink } from 'node:fs/promises';

/**
 * How media tools are shut in. `bubblewrap`: own namespaces, no network, no file but the input.
 * `prlimit`: resource limits alone, where the machine forbids user namespaces; the health page says so.
 */
export type SandboxMode = 'bubblewrap' | 'prlimit';

/** Name of the input inside the bubblewrap sandbox: the real name is never seen there. */
export const SANDBOXED_INPUT = '/input';

/** Programs and their libraries; nothing else of the machine is visible. */
const BOUND_FOLDERS = ['/usr/bin', '/usr/lib', '/usr/lib64', '/usr/local/bin', '/usr/local/lib'];
const BOUND_IF_PRESENT = ['/etc/alternatives', '/etc/ld.so.cache'];
/** Folders that newer systems replace by links into /usr. */
const LINKED_FOLDERS = ['/bin', '/lib', '/lib64'];
const NOBODY = '65534';

let detected: Promise<SandboxMode> | undefined;
let rootArguments: Promise<readonly string[]> | undefined;

/** Finds out once, by trying, whether this machine lets us make namespaces. */
export function detectSandboxMode(): Promise<SandboxMode> {
  detected ??= tryBubblewrap();
  return detected;
}

async function tryBubblewrap(): Promise<SandboxMode> {
  const programArguments = [...(await bubblewrapArguments(null)), 'true'];
  return new Promise((resolve) => {
    execFile('bwrap', programArguments, { timeout: 10_000 }, (error) => {
      resolve(error === null ? 'bubblewrap' : 'prlimit');
    });
  });
}

/**
 * Arguments of `bwrap` up to the program to run: all namespaces new (so no network), no capabilities, an
 * empty environment, the tools and one input read-only, the end of the parent as the end of the child.
 *
 * @param inputPath absolute path of the file to bind, or null for none
 */
export async function bubblewrapArguments(inputPath: string | null): Promise<string[]> {
  rootArguments ??= bindRoot();
  const input = inputPath === null ? [] : ['--ro-bind', inputPath, SANDBOXED_INPUT];
  return [
    ...['--unshare-all', '--die-with-parent', '--cap-drop', 'ALL', '--uid', NOBODY, '--gid', NOBODY],
    ...['--clearenv', '--setenv', 'PATH', '/usr/local/bin:/usr/bin'],
    ...(await rootArguments),
    ...input,
    '--',
  ];
}

async function bindRoot(): Promise<string[]> {
  const bound = [...BOUND_FOLDERS, ...BOUND_IF_PRESENT].flatMap((path) => ['--ro-bind-try', path, path]);
  const linked = await Promise.all(LINKED_FOLDERS.map(linkOrBind));
  return [...bound, ...linked.flat(), '--dev', '/dev'];
}

async function linkOrBind(path: string): Promise<string[]> {
  const status = await lstat(path).catch(() => null);
  if (status === null) return [];
  return status.isSymbolicLink() ? ['--symlink', await readlink(path), path] : ['--ro-bind', path, path];
}
