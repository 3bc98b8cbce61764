import { describe, expect, it } from 'vitest';
import { apiClient } from '#tests/support/apiClient.ts';
import { createBenchWithAccounts } from '#tests/factories/account.ts';
import { createMeasuredRecording } from '#tests/factories/recording.ts';

const anonymous = apiClient();

describe('GET /healthz', () => {
  it('answers live to everyone, with a worthless token too', async () => {
    for (const client of [anonymous, apiClient({ token: 'rb_invented' })]) {
      expect(await client.get('/healthz')).toMatchObject({ status: 200, body: { status: 'live' } });
    }
  });
});

describe('GET /readyz', () => {
  it('says what works and how media tools are shut in', async () => {
    const answer = await anonymous.get('/readyz');
    expect(answer.body).toMatchObject({
      status: 'ready',
      checks: { database: 'ok', schema: 'ok', storage: 'ok', worker: 'ok', redis: 'ok' },
    });
    expect(['bubblewrap', 'prlimit']).toContain((answer.body as { sandbox: string }).sandbox);
  });
});

describe('GET /metrics', () => {
  it('counts requests by route and recordings by state, and names no bench', async () => {
    const bench = await createBenchWithAccounts('canary bench');
    const row = { benchId: bench.benchId, uploadedBy: bench.owner.id };
    const { recording } = await createMeasuredRecording({ ...row, rpm: 3000, fileName: 'canary.wav' });
    await apiClient(bench.owner).get(`/api/v1/builds/${recording.id}`);
    const { headers, text } = await anonymous.get('/metrics');
    expect(headers.get('content-type')).toContain('text/plain');
    expect(text).toMatch(/^ripplebench_recordings\{state="done"\} [1-9]/m);
    expect(text).toMatch(
      /^ripplebench_http_request_duration_seconds_count\{method="GET",route="\/api\/v1\/builds\/\[id\]",status="404"\} [1-9]/m,
    );
    for (const secret of ['canary', recording.id, bench.benchId, bench.owner.email]) expect(text).not.toContain(secret);
  });
});
