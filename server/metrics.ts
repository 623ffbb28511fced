import type { FastifyInstance } from 'fastify';

const bucketSeconds = [0.005, 0.01, 0.025, 0.05, 0.1, 0.25, 0.5, 1, 2.5, 5, 10] as const;

interface Series {
  readonly labels: string;
  readonly buckets: number[];
  count: number;
  sumSeconds: number;
}

/**
 * Counts and times the requests of an instance, by route template (never by id, so that the number
 * of series stays bounded). Returns the present values in the Prometheus text format.
 */
export function measureRequests(
  app: FastifyInstance,
  lastBackupAt: () => number | null = () => null,
): () => string {
  const series = new Map<string, Series>();
  app.addHook('onResponse', async (request, reply) => {
    const route = request.routeOptions.url ?? 'none';
    const labels = `method="${request.method}",route="${route}",status="${reply.statusCode}"`;
    const found = series.get(labels) ?? emptySeries(labels);
    series.set(labels, found);
    observe(found, reply.elapsedTime / 1000);
  });
  return () => requestText([...series.values()]) + processText() + backupText(lastBackupAt());
}

function emptySeries(labels: string): Series {
  return { labels, buckets: bucketSeconds.map(() => 0), count: 0, sumSeconds: 0 };
}

function observe(series: Series, seconds: number): void {
  series.count += 1;
  series.sumSeconds += seconds;
  for (const [i, bound] of bucketSeconds.entries()) {
    if (seconds <= bound) series.buckets[i] += 1;
  }
}

function requestText(all: readonly Series[]): string {
  const name = 'sweep_ledger_http_request_duration_seconds';
  const lines = all.flatMap(({ labels, buckets, count, sumSeconds }) => [
    ...buckets.map((n, i) => `${name}_bucket{${labels},le="${bucketSeconds[i]}"} ${n}`),
    `${name}_bucket{${labels},le="+Inf"} ${count}`,
    `${name}_sum{${labels}} ${sumSeconds}`,
    `${name}_count{${labels}} ${count}`,
  ]);
  return metricText(name, 'histogram', 'Time to answer a request.', lines);
}

function processText(): string {
  const resident = 'process_resident_memory_bytes';
  const started = 'process_start_time_seconds';
  return (
    metricText(resident, 'gauge', 'Resident memory.', [
      `${resident} ${process.memoryUsage.rss()}`,
    ]) +
    metricText(started, 'gauge', 'Start of the process since 1970-01-01.', [
      `${started} ${Math.round(performance.timeOrigin) / 1000}`,
    ])
  );
}

/** Nothing where no backup was made: a rule on its absence then tells, where a 0 may mislead. */
function backupText(lastBackupAt: number | null): string {
  if (lastBackupAt === null) return '';
  const name = 'sweep_ledger_last_backup_timestamp_seconds';
  const lines = [`${name} ${lastBackupAt / 1000}`];
  return metricText(name, 'gauge', 'Begin of the newest good backup since 1970-01-01.', lines);
}

/** One metric with its samples in the Prometheus text format. */
export function metricText(
  name: string,
  type: string,
  help: string,
  lines: readonly string[],
): string {
  return `# HELP ${name} ${help}\n# TYPE ${name} ${type}\n${lines.map((line) => `${line}\n`).join('')}`;
}
