/** Plain progress lines with the time since the command began; on standard error, so that output stays clean. */
const startedAt = process.hrtime.bigint();

/** @returns {string} seconds since the command began, with one decimal */
export function elapsed() {
  return (Number(process.hrtime.bigint() - startedAt) / 1e9).toFixed(1);
}

/** @param {string} message */
export function progress(message) {
  process.stderr.write(`[${elapsed().padStart(6)} s] ${message}\n`);
}

/** A failure that the person can mend; printed without a stack. */
export class SetupError extends Error {}

/**
 * Runs the body of a command and turns its end into an exit status.
 * @param {() => Promise<number | void>} body
 */
export async function runCommand(body) {
  try {
    process.exitCode = (await body()) ?? 0;
  } catch (error) {
    process.stderr.write(`${error instanceof SetupError ? error.message : (error?.stack ?? error)}\n`);
    process.exitCode = 1;
  }
}
