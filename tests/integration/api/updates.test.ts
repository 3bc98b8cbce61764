import { randomBytes, randomUUID } from 'node:crypto';
import { Readable } from 'node:stream';
import type { ReadableStream as NodeReadableStream } from 'node:stream/web';
import { setTimeout as pause } from 'node:timers/promises';
import { afterEach, beforeAll, describe, expect, it } from 'vitest';
import { updateEvent, type UpdateEvent } from '#lib/schemas/update.ts';
import { database } from '#server/database/connection.ts';
import { AuthSession } from '#server/models/AuthSession.ts';
import { Membership } from '#server/models/Membership.ts';
import { OutboxEvent } from '#server/models/OutboxEvent.ts';
import { updatesFeed } from '#server/usecases/updatesFeed.ts';
import { createBenchWithAccounts, type TestBench } from '#tests/factories/account.ts';
import { wavFile } from '#tests/factories/wavFile.ts';
import { apiClient, baseUrl, signInCookie } from '#tests/support/apiClient.ts';
import { expectProblem } from '#tests/support/expectProblem.ts';
import { upload } from '#tests/support/uploads.ts';
import { watchStatements } from '#tests/support/watchStatements.ts';

/** The promise: half a second between looks, and a little for the queries on a busy machine. */
const LATENCY_SECONDS = 0.9;

interface ReceivedEvent {
  readonly id: number;
  readonly event: UpdateEvent;
}

class TestStream {
  readonly events: ReceivedEvent[] = [];
  hasEnded = false;
  readonly #abort = new AbortController();

  async open(headers: Record<string, string>): Promise<Response> {
    const response = await fetch(`${baseUrl()}/api/v1/updates`, { headers, signal: this.#abort.signal });
    void this.#read(response)
      .catch(() => undefined)
      .finally(() => (this.hasEnded = true));
    return response;
  }

  close(): void {
    this.#abort.abort();
  }

  async #read(response: Response): Promise<void> {
    let text = '';
    const decoder = new TextDecoder();
    if (response.body === null) return;
    for await (const chunk of Readable.fromWeb(response.body as NodeReadableStream) as AsyncIterable<Uint8Array>) {
      text += decoder.decode(chunk, { stream: true });
      const blocks = text.split('\n\n');
      text = blocks.pop() ?? '';
      for (const block of blocks) this.#take(block);
    }
  }

  #take(block: string): void {
    const [, id, data] = /^event: change\nid: (\d+)\ndata: (.+)$/.exec(block) ?? [];
    if (id !== undefined) this.events.push({ id: Number(id), event: updateEvent.parse(JSON.parse(data ?? '')) });
  }
}

const streams: TestStream[] = [];
let bench: TestBench;
let foreign: TestBench;

async function listen(headers: Record<string, string>): Promise<TestStream> {
  const stream = new TestStream();
  streams.push(stream);
  const response = await stream.open(headers);
  expect(response.status).toBe(200);
  expect(response.headers.get('content-type')).toBe('text/event-stream');
  return stream;
}

const asHolder = ({ token }: { token: string }) => ({ authorization: `Bearer ${token}` });

const eventOf = (benchId: string) => ({
  benchId,
  topic: 'recording',
  payload: { topic: 'recording', recordingId: randomUUID(), sessionId: null, benchId, status: 'done' },
  dedupeKey: Buffer.from(randomUUID()),
});

beforeAll(async () => {
  [bench, foreign] = await Promise.all([createBenchWithAccounts(), createBenchWithAccounts()]);
});
afterEach(() => {
  for (const stream of streams.splice(0)) stream.close();
});

describe('GET /api/v1/updates', () => {
  it('refuses nobody with 401', async () => {
    expectProblem(await apiClient().get('/api/v1/updates'), 'not-signed-in');
  });

  it('tells within 0.9 s of what is committed, and nothing of another bench', async () => {
    const stream = await listen(asHolder(bench.viewer));
    await OutboxEvent.create(eventOf(foreign.benchId));
    const mine = await OutboxEvent.create(eventOf(bench.benchId));
    await expect.poll(() => stream.events, { timeout: LATENCY_SECONDS * 1000, interval: 20 }).toHaveLength(1);
    expect(stream.events[0]).toEqual({ id: mine.id, event: mine.payload });
  });

  it('moves a recording from queued over working to done', async () => {
    const stream = await listen(asHolder(bench.viewer));
    const { id } = await upload(bench.member, { bytes: wavFile({ durationSeconds: 1, seed: 600 }) });
    const statuses = () =>
      stream.events.filter(({ event }) => event.recordingId === id).map(({ event }) => event.status);
    await expect.poll(statuses, { timeout: 15_000 }).toEqual(['queued', 'working', 'done']);
  });

  it('tells of a transaction that commits after a later one', async () => {
    const stream = await listen(asHolder(bench.viewer));
    const slow = await database.transaction();
    const early = await OutboxEvent.create(eventOf(bench.benchId), { transaction: slow });
    const late = await OutboxEvent.create(eventOf(bench.benchId));
    await expect.poll(() => stream.events.map(({ id }) => id)).toEqual([late.id]);
    await slow.commit();
    await expect.poll(() => stream.events.map(({ id }) => id)).toEqual([late.id, early.id]);
    expect(early.id).toBeLessThan(late.id);
  });

  it('repeats what was missed after Last-Event-ID, and once', async () => {
    const seen = await OutboxEvent.create(eventOf(bench.benchId));
    const missed = [await OutboxEvent.create(eventOf(bench.benchId)), await OutboxEvent.create(eventOf(bench.benchId))];
    await OutboxEvent.create(eventOf(foreign.benchId));
    const stream = await listen({ ...asHolder(bench.viewer), 'last-event-id': String(seen.id) });
    const next = await OutboxEvent.create(eventOf(bench.benchId));
    const wanted = [...missed.map(({ id }) => id), next.id];
    await expect.poll(() => stream.events.map(({ id }) => id), { timeout: 3000 }).toEqual(wanted);
  });

  it('starts anew without or with a Last-Event-ID that is none', async () => {
    await OutboxEvent.create(eventOf(bench.benchId));
    const quiet = await Promise.all(
      ['', 'x', '1e3', '-1'].map((id) => listen({ ...asHolder(bench.viewer), 'last-event-id': id })),
    );
    const next = await OutboxEvent.create(eventOf(bench.benchId));
    for (const stream of quiet) await expect.poll(() => stream.events.map(({ id }) => id)).toEqual([next.id]);
  });

  it('ends the stream when the sign-in ends or the role is taken', async () => {
    const left = await createBenchWithAccounts();
    const cookie = await signInCookie(left.viewer);
    const [signedIn, member] = [await listen({ cookie }), await listen(asHolder(left.member))];
    await AuthSession.destroy({ where: { accountId: left.viewer.id } });
    await Membership.destroy({ where: { accountId: left.member.id, benchId: left.benchId } });
    await expect.poll(() => [signedIn.hasEnded, member.hasEnded], { timeout: 15_000 }).toEqual([true, true]);
  });
});

describe('updatesFeed', () => {
  it('asks the database twice a second for 100 listeners, and not at all for none', async () => {
    let queryCount = 0;
    const stopWatch = watchStatements((statement) => {
      if (/outbox|auth_sessions/.test(statement)) queryCount += 1;
    });
    const listener = () => ({
      credential: { via: 'token', secretHash: randomBytes(32) } as const,
      onEvents: () => undefined,
      onEnd: () => undefined,
    });
    const stops = await Promise.all(Array.from({ length: 100 }, () => updatesFeed.listen(listener(), [bench.benchId])));
    await pause(3000);
    // One at the start, six looks, and one of either more or less at the edges of the time.
    expect(queryCount).toBeLessThanOrEqual(8);
    expect(queryCount).toBeGreaterThanOrEqual(4);
    for (const stop of [...stops, ...stops]) stop();
    await pause(700);
    queryCount = 0;
    await pause(1500);
    expect(queryCount).toBe(0);
    stopWatch();
  });
});
