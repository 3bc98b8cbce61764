import { readdir } from 'node:fs/promises';
import { join } from 'node:path';
import { expect } from 'vitest';
import { AuditEntry } from '#server/models/AuditEntry.ts';
import { OutboxEvent } from '#server/models/OutboxEvent.ts';
import { Recording } from '#server/models/Recording.ts';
import { settings } from '#server/env.ts';

/** What a refused upload must not leave behind. */
export interface Traces {
  readonly recordings: number;
  readonly events: number;
  /** Lines about recordings; a refusal itself may be noted. */
  readonly audits: number;
}

export async function tracesOf(benchId: string): Promise<Traces> {
  const [recordings, events, audits] = await Promise.all([
    Recording.count({ where: { benchId } }),
    OutboxEvent.count({ where: { benchId } }),
    AuditEntry.count({ where: { benchId, objectType: 'recording' } }),
  ]);
  return { recordings, events, audits };
}

const storageFolder = (): string => join(settings().dataFolder, 'storage');

/** Names of files that are on their way in. */
export async function temporaryNames(): Promise<string[]> {
  return readdir(join(storageFolder(), 'tmp')).catch(() => []);
}

/**
 * Waits until nothing is left of what came in since `before`: uploads of other tests come and go, a forgotten one
 * stays.
 */
export async function expectNoTemporarySince(before: readonly string[]): Promise<void> {
  const suspects = (await temporaryNames()).filter((name) => !before.includes(name));
  const left = async () => (await temporaryNames()).filter((name) => suspects.includes(name));
  await expect.poll(left, { timeout: 10_000 }).toEqual([]);
}

/** Ids of all stored blobs. */
export async function blobIds(): Promise<Set<string>> {
  const names = await readdir(join(storageFolder(), 'blobs'), { recursive: true }).catch(() => []);
  return new Set(names.map((name) => name.split('/').at(-1) ?? '').filter((name) => name.length === 36));
}
