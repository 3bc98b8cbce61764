import { createHash } from 'node:crypto';
import { once } from 'node:events';
import { readFile } from 'node:fs/promises';
import { createServer, type AddressInfo } from 'node:net';
import { join } from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { afterAll, describe, expect, it } from 'vitest';
import { wavFile } from '#tests/factories/wavFile.ts';
import { LabProcess, openWorkerLab, until } from '#tests/support/workerLab.ts';

// Database and storage of our own: what a killed server leaves must not lie about for other tests.
const lab = await openWorkerLab();
const { Recording } = await import('#server/models/Recording.ts');
const { blobStorage } = await import('#server/storage/blobStorage.ts');
const { createBenchWithAccounts } = await import('#tests/factories/account.ts');
const { filePart, FORM_END, openUpload, sendRaw } = await import('#tests/support/uploads.ts');

const servers: LabProcess[] = [];
const bench = await createBenchWithAccounts();
/** The one that is never killed. */
const { url: steadyUrl } = await startServer();

afterAll(async () => {
  await Promise.all(servers.map((server) => server.end('SIGKILL')));
  await lab.close();
});

async function freePort(): Promise<number> {
  const server = createServer().listen(0, '127.0.0.1');
  await once(server, 'listening');
  const { port } = server.address() as AddressInfo;
  server.close();
  return port;
}

/** A built web server over the database and the storage of the lab. */
async function startServer(): Promise<{ server: LabProcess; url: string }> {
  const build = process.env.RIPPLEBENCH_TEST_BUILD;
  if (build === undefined) throw new Error('RIPPLEBENCH_TEST_BUILD is missing: run integration tests with npm test.');
  const port = await freePort();
  const env = { ...process.env, PORT: String(port), HOST: '127.0.0.1' };
  const server = new LabProcess(process.execPath, ['scripts/serve.mjs', join(build, '../web')], env);
  servers.push(server);
  const url = `http://127.0.0.1:${String(port)}`;
  const isUp = () => fetch(`${url}/api/v1/me`).then(({ status }) => status === 401);
  await until('the server answers', () => isUp().catch(() => false));
  return { server, url };
}

describe('an upload to a server that is killed', () => {
  // From the middle of the body over writing, renaming and committing to after the answer.
  it.each([
    ['in the middle of the body', 0.5, 0],
    ['0 ms after the last byte', 1, 0],
    ['10 ms after the last byte', 1, 10],
    ['20 ms after the last byte', 1, 20],
    ['40 ms after the last byte', 1, 40],
    ['300 ms after the last byte', 1, 300],
  ])('%s is there once, with its file, after the retry', async (moment, fraction, delayMilliseconds) => {
    const { server, url } = await startServer();
    const bytes = wavFile({ durationSeconds: 20, seed: 800 + delayMilliseconds });
    const body = Buffer.concat([filePart(bytes), FORM_END]);
    const headers = { 'content-length': body.length, 'idempotency-key': moment };
    const sent = openUpload(bench.member, headers, url);
    const isAcknowledged = once(sent, 'response').then(
      () => true,
      () => false,
    );
    const cut = Math.floor(body.length * fraction);
    await new Promise((resolve) => sent.write(body.subarray(0, cut), resolve));
    await pause(delayMilliseconds);
    await server.end('SIGKILL');
    const wasAcknowledged = await isAcknowledged;
    const where = { benchId: bench.benchId, idempotencyKey: Buffer.from(moment) };
    if (wasAcknowledged) expect(await Recording.count({ where })).toBe(1);
    const retried = await sendRaw(bench.member, { body, headers }, steadyUrl);
    expect([200, 201]).toContain(retried.status);
    if (wasAcknowledged) expect(retried.status).toBe(200);
    const rows = await Recording.findAll({ where });
    expect(rows).toHaveLength(1);
    const stored = await readFile(await blobStorage().pathForReading(rows[0]?.blobId ?? ''));
    expect(createHash('sha256').update(stored).digest('hex')).toBe(rows[0]?.sha256.toString('hex'));
    expect(stored.length).toBe(bytes.length);
  });
});

describe('a web server that is asked to stop', () => {
  it('ends the live updates of open pages at once, not after the grace for uploads', async () => {
    const { server, url } = await startServer();
    const headers = { authorization: `Bearer ${bench.member.token}` };
    const updates = await fetch(`${url}/api/v1/updates`, { headers });
    expect(updates.headers.get('content-type')).toContain('text/event-stream');
    const askedAt = performance.now();
    await server.end('SIGTERM');
    expect(await updates.text()).toContain('retry:');
    // The grace is 30 s; what is left is closing.
    expect(performance.now() - askedAt).toBeLessThan(5000);
  });
});
