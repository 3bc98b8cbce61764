import { spawn } from 'node:child_process';
import { SetupError } from './progress.mjs';

const SHOWN_LINE_COUNT = 30;

/**
 * Runs a program to its end.
 * @param {string} program
 * @param {string[]} programArguments
 * @param {import('node:child_process').SpawnOptions & { quiet?: boolean }} [options]
 *   quiet: keep the output and show it only when the program fails
 * @returns {Promise<number>} its exit status; with `quiet`, anything but 0 is thrown instead
 */
export async function run(program, programArguments, { quiet = false, ...options } = {}) {
  const child = spawn(program, programArguments, { stdio: quiet ? ['ignore', 'pipe', 'pipe'] : 'inherit', ...options });
  const output = [];
  child.stdout?.on('data', (chunk) => output.push(chunk));
  child.stderr?.on('data', (chunk) => output.push(chunk));
  const status = await new Promise((resolve, reject) => {
    child.once('error', reject);
    child.once('close', (code, signal) => resolve(signal ? 128 : code));
  });
  if (quiet && status !== 0) {
    const lines = Buffer.concat(output).toString().trimEnd().split('\n').slice(-SHOWN_LINE_COUNT);
    throw new SetupError(`${program} ${programArguments[0] ?? ''} failed (${status}):\n${lines.join('\n')}`);
  }
  return status;
}
