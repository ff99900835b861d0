/** What a monitoring system reads of the process, in the text format of Prometheus. */
import { Counter, Gauge, Histogram, Registry, collectDefaultMetrics } from 'prom-client';

/** Upper bounds of the classes of a request's time, s. */
const REQUEST_BUCKETS_S = [0.005, 0.01, 0.025, 0.05, 0.1, 0.25, 0.5, 1, 2.5, 5, 10];

export interface Metrics {
  /** @param route the path as declared ('/api/charges/:id'), so that no id is told */
  request(method: string, route: string, status: number, seconds: number): void;
  slowQuery(): void;
  /** Read whenever the figures are asked for. */
  watch(name: 'sockets' | 'backup_age_seconds' | 'sleeper_behind_seconds', read: () => number | Promise<number>): void;
  text(): Promise<{ type: string; body: string }>;
  close(): void;
}

const helpOf = {
  sockets: 'Sockets of screens that are connected',
  backup_age_seconds: 'Age of the newest copy of the data; -1: there is none',
  sleeper_behind_seconds: 'By how long the earliest due instant has passed; 0: nothing waits',
} as const;

/** @param version of the program, told as a label */
export function makeMetrics(version: string): Metrics {
  const registry = new Registry();
  collectDefaultMetrics({ register: registry, prefix: 'bidewell_' });
  new Gauge({ name: 'bidewell_build', help: 'The program', labelNames: ['version'], registers: [registry] }).set(
    { version },
    1,
  );
  const requests = new Histogram({
    name: 'bidewell_http_request_seconds',
    help: 'Time from a request to its answer',
    labelNames: ['method', 'route', 'status'],
    buckets: REQUEST_BUCKETS_S,
    registers: [registry],
  });
  const slow = new Counter({
    name: 'bidewell_slow_queries_total',
    help: 'Statements of the database that took longer than the log’s limit',
    registers: [registry],
  });
  return {
    request: (method, route, status, seconds) => requests.observe({ method, route, status }, seconds),
    slowQuery: () => slow.inc(),
    watch(name, read) {
      new Gauge({
        name: `bidewell_${name}`,
        help: helpOf[name],
        registers: [registry],
        async collect() {
          this.set(await read());
        },
      });
    },
    text: async () => ({ type: registry.contentType, body: await registry.metrics() }),
    close: () => registry.clear(),
  };
}
