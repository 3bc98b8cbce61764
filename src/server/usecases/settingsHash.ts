import { createHash } from 'node:crypto';
import type { AnalysisSettings } from '#lib/analysis/settings.ts';

/** SHA-256 that is equal for equal settings, whatever the order of their fields; 32 bytes. */
export function settingsHash(settings: AnalysisSettings): Buffer {
  const entries = Object.entries(settings).sort(([a], [b]) => (a < b ? -1 : 1));
  return createHash('sha256').update(JSON.stringify(entries)).digest();
}
