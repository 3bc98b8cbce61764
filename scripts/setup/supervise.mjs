import { progress } from './progress.mjs';

const FIRST_PAUSE_SECONDS = 0.5;
const LONGEST_PAUSE_SECONDS = 15;
/** What ran this long did not fall over its own start. */
const SETTLED_SECONDS = 60;

/**
 * Keeps a process running: when it ends by itself it is started again, after a pause that doubles while it ends at
 * once. Nothing acknowledged is lost meanwhile, because no process holds what is not in the database.
 * @param {{ name: string, child: import('node:child_process').ChildProcess,
 *   start: () => import('node:child_process').ChildProcess }} running its `child` is replaced by each new one
 * @returns {() => void} call it before the process is stopped on purpose
 */
export function supervise(running) {
  let isLeft = false;
  let pauseSeconds = FIRST_PAUSE_SECONDS;
  /** @type {NodeJS.Timeout | undefined} */
  let timer;

  function watch() {
    const startedAt = performance.now();
    running.child.once('exit', (status, signal) => startAgain(signal ?? `status ${status}`));
    // Not even started, for want of memory or process numbers; nobody listening would end us instead.
    running.child.once('error', (error) => startAgain(error.message));

    function startAgain(reason) {
      if (isLeft) return;
      if (performance.now() - startedAt > SETTLED_SECONDS * 1000) pauseSeconds = FIRST_PAUSE_SECONDS;
      progress(`${running.name} ended (${reason}); starting it again in ${pauseSeconds} s`);
      timer = setTimeout(() => {
        running.child = running.start();
        watch();
      }, pauseSeconds * 1000);
      pauseSeconds = Math.min(2 * pauseSeconds, LONGEST_PAUSE_SECONDS);
    }
  }

  watch();
  return () => {
    isLeft = true;
    clearTimeout(timer);
  };
}
