import { mkdtempSync, readFileSync, rmSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { parseArgs } from 'node:util';
import { type Filled, fillStore } from './fill-store.ts';
import { type Figure, median, printFigures } from './measure.ts';
import { type ServerProcess, serviceOn } from './service-process.ts';
import { asTouchstone, typicalSweep } from './typical-sweep.ts';

/** How the service behaves at a million sweeps beside a thousand; see `npm run bench:grow`. */
const { values } = parseArgs({
  options: {
    json: { type: 'string' },
    sweeps: { type: 'string', default: '1000000' },
    antennas: { type: 'string', default: '2000' },
  },
});
const many = { sweeps: Number(values.sweeps), antennas: Number(values.antennas) };
const few = { sweeps: 1000, antennas: 50 };

const rounds = 7;
const requestsEach = 40;
const uploadsEach = 60;

interface Side {
  readonly folder: string;
  readonly filled: Filled;
  readonly startMs: number[];
  readonly service: ServerProcess;
}

let uploaded = 0;

const folder = mkdtempSync(join(tmpdir(), 'sweep-ledger-grow-'));
const startedAt = performance.now();
try {
  const figures = await compare();
  printFigures(figures, values.json);
} finally {
  rmSync(folder, { recursive: true, force: true });
}
process.stdout.write(`${((performance.now() - startedAt) / 60_000).toFixed(1)} minutes\n`);

async function compare(): Promise<readonly Figure[]> {
  const small = await prepare('few', few);
  const large = await prepare('many', many);
  try {
    const historyOf = (query: string) =>
      readsInTurns(
        large,
        small,
        ({ filled }) => `/v1/antennas/${filled.antennaKey}/history?limit=50${query}`,
      );
    const history = await historyOf('');
    const dashboard = await readsInTurns(large, small, () => '/v1/dashboard');
    const list = await readsInTurns(
      large,
      small,
      ({ filled }) => `/v1/antennas/${filled.antennaKey}/sweeps?limit=50`,
    );
    const ofBand = await historyOf('&band=20m');
    const uploads = await uploadsInTurns(large, small);
    const bytes = statSync(join(large.folder, 'ledger.sqlite')).size;
    const at = `${many.sweeps} sweeps in ${many.antennas} antennas / ${few.sweeps}`;
    return [
      ratioFigure('history_growth', history, '<= 1.5', at),
      ratioFigure('dashboard_growth', dashboard, '<= 1.5', `${at}; a club of 50 antennas`),
      ratioFigure('sweep_list_growth', list, 'report', at),
      ratioFigure('history_of_band_growth', ofBand, 'report', at),
      ratioFigure('upload_growth', uploads, '>= 0.8', at),
      ratioFigure('start_ms', { large: large.startMs, small: small.startMs }, '<= 1.5', at),
      {
        key: 'rss_mb',
        value: residentMb(large.service),
        aim: '<= 150',
        unit: 'MB',
        detail: `after these reads and uploads; database ${(bytes / 1e9).toFixed(1)} GB`,
      },
    ];
  } finally {
    await Promise.all([small.service.stop(), large.service.stop()]);
  }
}

async function prepare(name: string, size: typeof few): Promise<Side> {
  const place = mkdtempSync(join(folder, `${name}-`));
  const began = performance.now();
  const filled = await fillStore(place, size, (done) => {
    process.stderr.write(`\r${name}: ${done} sweeps`);
  });
  process.stderr.write(
    `\r${name}: filled in ${((performance.now() - began) / 1000).toFixed(0)} s\n`,
  );
  const startMs: number[] = [];
  for (let round = 0; round < 5; round++) {
    const from = performance.now();
    const service = await serviceOn(place, filled.token);
    startMs.push(performance.now() - from);
    await service.stop();
  }
  return { folder: place, filled, startMs, service: await serviceOn(place, filled.token) };
}

interface InTurns {
  readonly large: readonly number[];
  readonly small: readonly number[];
}

/** Milliseconds a read, round by round in turns. */
async function readsInTurns(
  large: Side,
  small: Side,
  pathOf: (side: Side) => string,
): Promise<InTurns> {
  const times = { large: [] as number[], small: [] as number[] };
  for (let round = 0; round <= rounds; round++) {
    const ofLarge = await readTime(large, pathOf(large));
    const ofSmall = await readTime(small, pathOf(small));
    if (round === 0) continue;
    times.large.push(ofLarge);
    times.small.push(ofSmall);
  }
  return times;
}

async function readTime({ service }: Side, path: string): Promise<number> {
  const times: number[] = [];
  for (let i = 0; i < requestsEach; i++) {
    await writeSomething(service, i);
    const from = performance.now();
    const answer = await fetch(service.url + path, { headers: service.headers });
    await answer.arrayBuffer();
    if (!answer.ok) throw new Error(`${path} answered ${answer.status}`);
    times.push(performance.now() - from);
  }
  return median(times);
}

/** After a write no answer can be one that was sent before. */
async function writeSomething({ url, headers }: ServerProcess, number: number): Promise<void> {
  const answer = await fetch(`${url}/v1/sites/bench`, {
    method: 'PATCH',
    headers: { ...headers, 'content-type': 'application/json', 'if-match': '*' },
    body: JSON.stringify({ note: String(number) }),
  });
  await answer.arrayBuffer();
  if (!answer.ok) throw new Error(`An edit was answered ${answer.status}`);
}

/** Uploads a second. */
async function uploadsInTurns(large: Side, small: Side): Promise<InTurns> {
  const rates = { large: [] as number[], small: [] as number[] };
  for (let round = 0; round <= rounds; round++) {
    const ofLarge = await uploadRate(large);
    const ofSmall = await uploadRate(small);
    if (round === 0) continue;
    rates.large.push(ofLarge);
    rates.small.push(ofSmall);
  }
  return rates;
}

async function uploadRate({ service, filled }: Side): Promise<number> {
  const from = performance.now();
  for (let i = 0; i < uploadsEach; i++) {
    uploaded += 1;
    const body = `! upload ${uploaded}\r\n${asTouchstone(typicalSweep(101, uploaded))}`;
    const answer = await fetch(`${service.url}/v1/antennas/${filled.antennaKey}/sweeps`, {
      method: 'POST',
      headers: { ...service.headers, 'content-type': 'application/octet-stream' },
      body,
    });
    await answer.arrayBuffer();
    if (answer.status !== 201) throw new Error(`An upload was answered ${answer.status}`);
  }
  return (1000 * uploadsEach) / (performance.now() - from);
}

function ratioFigure(key: string, { large, small }: InTurns, aim: string, at: string): Figure {
  return {
    key,
    value: median(large.map((value, i) => value / small[i])),
    aim,
    unit: 'at many / at few',
    detail: `${at}: ${median(large).toPrecision(3)} / ${median(small).toPrecision(3)}`,
  };
}

/** Resident memory of the service's process. */
function residentMb({ pid }: ServerProcess): number {
  const status = readFileSync(`/proc/${pid}/status`, 'utf8');
  return Number(/VmRSS:\s+(\d+) kB/.exec(status)?.[1] ?? Number.NaN) / 1000;
}
