import { collectDefaultMetrics, Counter, Histogram, Registry } from 'prom-client';

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

const KNOWN_METHODS: readonly string[] = ['GET', 'HEAD', 'POST', 'PATCH', 'PUT', 'DELETE', 'OPTIONS'];

export function countRequest(request: { method: string; route: string; status: number }, elapsedSeconds: number): void {
  const method = KNOWN_METHODS.includes(request.method) ? request.method : 'other';
  requestDurations.observe({ method, route: request.route, status: String(request.status) }, elapsedSeconds);
}

export function countUpload(outcome: 'created' | 'repeated' | 'refused'): void {
  uploads.inc({ outcome });
}
