import pino from 'pino';
import { settings } from './env.ts';

let root: pino.Logger | undefined;

/** Structured log lines on standard output. Secrets are never passed in; these paths are cut as a second fence. */
export function logger(): pino.Logger {
  root ??= pino({
    level: settings().logLevel,
    base: null,
    timestamp: pino.stdTimeFunctions.isoTime,
    redact: ['password', '*.password', 'token', '*.token', 'headers.cookie', 'headers.authorization'],
  });
  return root;
}
