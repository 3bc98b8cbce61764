import { collectDefaultMetrics, Counter, Gauge, Histogram, Registry } from 'prom-client';
import { QueryTypes } from 'sequelize';
import { RECORDING_STATUSES } from '#lib/schemas/recording.ts';
import { database } from './database/connection.ts';
import { logger } from './logger.ts';

/** What the operator's monitoring reads. Labels hold routes and states, never a bench, a name or an id. */
export const metricsRegistry = new Registry();

collectDefaultMetrics({ register: metricsRegistry, prefix: 'ripplebench_' });

const requestDurations = new Histogram({
  name: 'ripplebench_http_request_duration_seconds',
  help: 'Time from the request to the first byte of the answer.',
  labelNames: ['method', 'route', 'status'],
  buckets: [0.005, 0.02, 0.05, 0.15, 0.3, 0.8, 2, 5, 30],
  registers: [metricsRegistry],
});

const uploads = new Counter({
  name: 'ripplebench_uploads_total',
  help: 'Uploads by outcome: created, repeated with the same key, or refused.',
  labelNames: ['outcome'],
  registers: [metricsRegistry],
});

new Gauge({
  name: 'ripplebench_recordings',
  help: 'Recordings by state: queued is the length of the queue.',
  labelNames: ['state'],
  registers: [metricsRegistry],
  async collect() {
    // Without a database the other figures are still worth reading.
    this.reset();
    const counts = await countByState().catch((error: unknown) => {
      logger().warn({ err: error }, 'the queue could not be counted');
      return null;
    });
    if (counts === null) return;
    for (const state of RECORDING_STATUSES) this.set({ state }, counts.get(state) ?? 0);
  },
});

async function countByState(): Promise<Map<string, number>> {
  const rows = await database.query<{ state: string; recordingCount: number | string }>(
    `/* every bench: the operator sees how much is waiting, not whose */
     SELECT state, COUNT(*) AS recordingCount FROM recordings GROUP BY state`,
    { type: QueryTypes.SELECT },
  );
  return new Map(rows.map(({ state, recordingCount }) => [state, Number(recordingCount)]));
}

const KNOWN_METHODS: readonly string[] = ['GET', 'HEAD', 'POST', 'PATCH', 'PUT', 'DELETE', 'OPTIONS'];

export function countRequest(request: { method: string; route: string; status: number }, elapsedSeconds: number): void {
  const method = KNOWN_METHODS.includes(request.method) ? request.method : 'other';
  requestDurations.observe({ method, route: request.route, status: String(request.status) }, elapsedSeconds);
}

export function countUpload(outcome: 'created' | 'repeated' | 'refused'): void {
  uploads.inc({ outcome });
}
