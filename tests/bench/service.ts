import { mkdtempSync, rmSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import autocannon from 'autocannon';
import { type Figure, median } from './measure.ts';
import { type ServerProcess, startFloor, startService } from './service-process.ts';
import { asTouchstone, typicalSweep } from './typical-sweep.ts';

const rounds = 5;
const secondsEach = 2;
const typicalPoints = 401;

interface Load {
  readonly perSecond: number;
  readonly p50Ms: number;
  readonly p99Ms: number;
}

/** The whole service over loopback against a bare server that only keeps or sends the bytes. */
export async function serviceFigures(): Promise<readonly Figure[]> {
  const folder = mkdtempSync(join(tmpdir(), 'sweep-ledger-bench-'));
  const service = await startService(folder);
  const summaryPath = await firstSummary(service);
  const constant = await (
    await fetch(service.url + summaryPath, { headers: service.headers })
  ).text();
  const floor = await startFloor(folder, constant);
  try {
    return [
      ...(await uploadFigures(service, floor)),
      await readWhileWriting(service, summaryPath),
      ...(await readFigures(service, floor, summaryPath)),
      await bytesFigure(service, folder),
    ];
  } finally {
    await service.stop();
    await floor.stop();
    rmSync(folder, { recursive: true, force: true });
  }
}

let filesMade = 0;
let bytesSent = 0;

/** A file that was never sent before. */
function freshFile(): Buffer {
  filesMade += 1;
  return Buffer.from(`! ${filesMade}\r\n${asTouchstone(typicalSweep(typicalPoints, filesMade))}`);
}

async function firstSummary(service: ServerProcess): Promise<string> {
  const answer = await fetch(`${service.url}/v1/antennas/bench/sweeps`, {
    method: 'POST',
    headers: service.headers,
    body: freshFile(),
  });
  const { id } = (await answer.json()) as { id: string };
  return `/v1/sweeps/${id}/summary`;
}

async function uploadFigures(service: ServerProcess, floor: ServerProcess): Promise<Figure[]> {
  const alone = await inTurns(
    () => uploads(service, '/v1/antennas/bench/sweeps', 1),
    () => uploads(floor, '/keep', 1),
  );
  const crowd = await inTurns(
    () => uploads(service, '/v1/antennas/bench/sweeps', 32),
    () => uploads(floor, '/keep', 32),
  );
  const spread = median(crowd.first.map(({ p50Ms, p99Ms }) => p99Ms / p50Ms));
  return [
    figure('upload_vs_floor', alone, '>= 0.6', 'one client'),
    figure('upload_group_vs_floor', crowd, '>= 1.0', '32 clients'),
    {
      key: 'upload_p99_vs_p50',
      value: spread,
      aim: '<= 4',
      unit: 'ratio of times',
      detail: '32 clients',
    },
  ];
}

async function readFigures(
  service: ServerProcess,
  floor: ServerProcess,
  path: string,
): Promise<Figure[]> {
  const summary = await inTurns(
    () => reads(service, path),
    () => reads(floor, '/constant'),
  );
  const answer = await fetch(service.url + path, { headers: service.headers });
  const etag = answer.headers.get('etag') ?? '';
  const notModified = await inTurns(
    () => reads(service, path, { 'if-none-match': etag }),
    () => reads(floor, '/constant'),
  );
  return [
    figure('summary_vs_string', summary, '>= 0.6', 'GET summary'),
    figure('not_modified_vs_string', notModified, '>= 0.7', 'GET with a matching ETag'),
  ];
}

async function readWhileWriting(service: ServerProcess, path: string): Promise<Figure> {
  const quiet: number[] = [];
  const busy: number[] = [];
  for (let round = 0; round < rounds; round++) {
    quiet.push((await reads(service, path, {}, 2)).p99Ms);
    const [{ p99Ms }] = await Promise.all([
      reads(service, path, {}, 2),
      uploads(service, '/v1/antennas/bench/sweeps', 8),
    ]);
    busy.push(p99Ms);
  }
  return {
    key: 'read_while_writing',
    value: median(busy) / median(quiet),
    aim: '<= 3',
    unit: 'p99 with / without uploads',
    detail: `${median(busy).toFixed(1)} ms / ${median(quiet).toFixed(1)} ms`,
  };
}

async function bytesFigure(service: ServerProcess, folder: string): Promise<Figure> {
  await service.stop();
  const bytes = statSync(join(folder, 'service', 'ledger.sqlite')).size;
  return {
    key: 'bytes_per_sweep',
    value: bytes / bytesSent,
    aim: '<= 0.7',
    unit: 'database bytes / file bytes',
    detail: `${filesMade} files of ${typicalPoints} points, some sent to the floor`,
  };
}

interface Turns {
  readonly first: readonly Load[];
  readonly second: readonly Load[];
}

/** Two loads in turns after one uncounted round of each. */
async function inTurns(first: () => Promise<Load>, second: () => Promise<Load>): Promise<Turns> {
  const turns = { first: [] as Load[], second: [] as Load[] };
  for (let round = 0; round <= rounds; round++) {
    const a = await first();
    const b = await second();
    if (round === 0) continue;
    turns.first.push(a);
    turns.second.push(b);
  }
  return turns;
}

function figure(key: string, { first, second }: Turns, aim: string, what: string): Figure {
  const value = median(first.map(({ perSecond }, i) => perSecond / second[i].perSecond));
  const rate = (loads: readonly Load[]) =>
    median(loads.map(({ perSecond }) => perSecond)).toFixed(0);
  return {
    key,
    value,
    aim,
    unit: 'our rate / floor',
    detail: `${what}: ${rate(first)}/s, floor ${rate(second)}/s`,
  };
}

async function uploads(server: ServerProcess, path: string, connections: number): Promise<Load> {
  const isService = path !== '/keep';
  const result = await autocannon({
    url: server.url,
    connections,
    duration: secondsEach,
    requests: [
      {
        method: 'POST',
        path,
        headers: { ...server.headers, 'content-type': 'application/octet-stream' },
        setupRequest: (request) => {
          const body = freshFile();
          if (isService) bytesSent += body.length;
          return { ...request, body };
        },
      },
    ],
  });
  return loadOf(result);
}

async function reads(
  server: ServerProcess,
  path: string,
  headers: Readonly<Record<string, string>> = {},
  connections = 16,
): Promise<Load> {
  const result = await autocannon({
    url: server.url + path,
    connections,
    duration: secondsEach,
    headers: { ...server.headers, ...headers },
  });
  return loadOf(result);
}

function loadOf({ requests, latency, non2xx, statusCodeStats, errors }: autocannon.Result): Load {
  const unexpected = Object.keys(statusCodeStats ?? {}).filter(
    (status) => !['200', '201', '304'].includes(status),
  );
  if (errors > 0 || unexpected.length > 0) {
    throw new Error(`${errors} errors, ${non2xx} other answers (${unexpected.join(', ')})`);
  }
  return { perSecond: requests.average, p50Ms: latency.p50 || 0.5, p99Ms: latency.p99 || 0.5 };
}
