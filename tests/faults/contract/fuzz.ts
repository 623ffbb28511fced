import fc from 'fast-check';
import { addAntenna, resonatorFile, upload } from '../../support/club-records.ts';
import type { TestApp } from '../../support/test-app.ts';
import { currentTag, type FuzzRequest, lineFile, operations, requestTo } from './requests.ts';
import type { Surroundings } from './schema-values.ts';

export interface FuzzOutcome {
  readonly requests: number;
  readonly byStatus: Readonly<Record<number, number>>;
  /** Operations that answered a 2xx at least once. */
  readonly succeeded: ReadonlySet<string>;
  /** One for each kind of fault, with the first request that showed it. */
  readonly faults: readonly string[];
}

/** After so many rounds over all operations the service is a new one, so that lists stay short. */
const roundsPerService = 10;

/** Sends at least that many requests, the same share to every operation. */
export async function fuzz(
  newApp: () => Promise<TestApp>,
  requests: number,
  seed: number,
): Promise<FuzzOutcome> {
  const byStatus: Record<number, number> = {};
  const succeeded = new Set<string>();
  const faults = new Map<string, string>();
  let sent = 0;
  for (let start = 0; sent < requests; start++) {
    const app = await newApp();
    const known = await addRecords(app);
    const samples = operations.map((operation, i) => {
      const settings = { numRuns: roundsPerService, seed: seed + 1000 * start + i };
      return fc.sample(requestTo(operation, known), settings);
    });
    for (let round = 0; round < roundsPerService && sent < requests; round++) {
      for (const [i, { method, template }] of operations.entries()) {
        const operation = `${method} ${template}`;
        const { status, fault } = await send(app, samples[i][round]);
        sent += 1;
        if (status !== null) byStatus[status] = (byStatus[status] ?? 0) + 1;
        if (status !== null && status < 300) succeeded.add(operation);
        if (fault === null) continue;
        // The id of the request alone makes no other fault.
        const kind = `${operation} ${fault.replaceAll(/urn:uuid:[\w-]+/g, '')}`.slice(0, 300);
        const request = JSON.stringify(samples[i][round]).slice(0, 2000);
        if (!faults.has(kind)) faults.set(kind, `${fault}\n  ${operation}: ${request}`);
      }
    }
    await app.close();
  }
  return { requests: sent, byStatus, succeeded, faults: [...faults.values()] };
}

async function send(
  app: TestApp,
  request: FuzzRequest,
): Promise<{ status: number | null; fault: string | null }> {
  try {
    const headers = { ...request.headers };
    if (headers['if-match'] === currentTag) {
      const { etag } = (await app.call({ url: request.url })).headers;
      headers['if-match'] = String(etag);
    }
    const answer = await app.call({ ...request, headers });
    const status = answer.statusCode;
    return { status, fault: status < 500 ? null : `answers ${status}: ${answer.body}` };
  } catch (error) {
    return { status: null, fault: String(error) };
  }
}

/** One record of each kind, and their names for requests that shall reach them. */
async function addRecords(app: TestApp): Promise<Surroundings['known']> {
  const add = async (url: string, payload: object): Promise<Record<string, unknown>> => {
    const answer = await app.call({ method: 'POST', url, payload });
    if (answer.statusCode !== 201) throw new Error(`${url}: ${answer.body}`);
    return answer.json();
  };
  const antenna = await addAntenna(app);
  const analyzer = await add('/v1/analyzers', { key: 'bench', name: 'Bench' });
  const sweeps = [];
  for (const comment of ['first', 'second', 'third']) {
    sweeps.push(idIn((await upload(app, resonatorFile({ comment }), '?analyzer=bench')).json()));
  }
  const cable = await add('/v1/cables', {
    key: 'reel',
    name: 'Reel',
    characteristic_ohm: 50,
    velocity_factor: 0.8,
    points: [
      { frequency_hz: 5e6, loss_db_per_100_m: 1.9 },
      { frequency_hz: 5e7, loss_db_per_100_m: 4.8 },
      { frequency_hz: 2e8, loss_db_per_100_m: 9.7 },
    ],
    source: 'its sheet',
  });
  const work = await add('/v1/antennas/field-20m/work', {
    kind: 'trimmed',
    done_at: '2026-05-17T13:00:00Z',
    length_mm: 120,
  });
  // Not the member and token that ask: they are to stay.
  const member = await add('/v1/members', {
    role: 'measurer',
    person: { name: 'Invented Member' },
  });
  const token = await add('/v1/tokens', { label: 'spare' });
  const webhook = await add('/v1/webhooks', { url: 'https://club.example/hook' });
  const check = await app.call({
    method: 'POST',
    url: '/v1/antennas/field-20m/line-checks?far_end=open&cable=m17-74-rg213',
    headers: { 'content-type': 'application/octet-stream' },
    payload: lineFile,
  });
  return {
    site: ['field', String(antenna['site_id'])],
    antenna: ['field-20m', idIn(antenna)],
    analyzer: ['bench', idIn(analyzer)],
    cable: ['reel', 'm17-74-rg213', idIn(cable)],
    sweep: sweeps,
    other: sweeps,
    sweeps,
    work: [idIn(work)],
    check: [idIn(check.json())],
    member: [idIn(member)],
    token: [idIn(token)],
    webhook: [idIn(webhook)],
    club: ['test-club'],
    slug: ['not-found'],
    band: ['20m'],
    plan: ['iaru-r1'],
    columns: ['frequency:MHz,swr', 'frequency:MHz,reflection_re,reflection_im'],
  };
}

function idIn(record: Readonly<Record<string, unknown>>): string {
  const { id } = record;
  if (typeof id !== 'string') throw new Error(`No id: ${JSON.stringify(record)}`);
  return id;
}
