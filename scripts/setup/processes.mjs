import { spawn } from 'node:child_process';

/**
 * Starts one of our own long-running programs under this Node, in a process group of its own.
 * @param {string} name shown when it ends unexpectedly
 * @param {string[]} programArguments script and its arguments
 * @param {{ env: NodeJS.ProcessEnv, cwd: string, stdio?: import('node:child_process').StdioOptions, nice?: number }} options
 */
export function startProcess(name, programArguments, { env, cwd, stdio = 'inherit' }) {
  const start = () => spawn(process.execPath, programArguments, { env, cwd, stdio, detached: true });
  return { name, child: start(), start };
}

/** @returns {Promise<void>} when the process has ended */
export function ended({ child }) {
  if (child.exitCode !== null || child.signalCode !== null) return Promise.resolve();
  return new Promise((done) => child.once('exit', () => done()));
}

/**
 * Stops processes one after the other (those that use a server before the server), each with SIGTERM and, when
 * its grace has run out, SIGKILL.
 * @param {{ name: string, child: import('node:child_process').ChildProcess }[]} processes in the order of stopping
 * @param {number} graceSeconds
 */
export async function stopProcesses(processes, graceSeconds) {
  for (const running of processes) {
    if (running.child.exitCode !== null || running.child.signalCode !== null) continue;
    running.child.kill('SIGTERM');
    const timer = setTimeout(() => running.child.kill('SIGKILL'), graceSeconds * 1000);
    await ended(running);
    clearTimeout(timer);
  }
}
