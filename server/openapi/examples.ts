import type { OpenAPIV3_1 } from 'openapi-types';
import type { App } from '../http/app-type.ts';
import { sampleFile, sampleLineFile } from '../sample-file.ts';
import { operationsOf } from './document.ts';

/** A request whose real answer stands in the document as the example of its operation. */
interface ExampleCall {
  readonly method?: 'GET' | 'POST' | 'PATCH';
  readonly url: string;
  readonly body?: string | Readonly<Record<string, unknown>>;
  readonly headers?: Readonly<Record<string, string>>;
}

/** Ids of records of the demo club that the examples are of. */
interface ExampleRecords {
  readonly sweep: string;
  readonly member: string;
  /** A sweep through a feed line. */
  readonly throughLine: string;
  /** A check of that feed line. */
  readonly lineCheck: string;
}

/** By operation, in the order in which they are made. */
function calls({
  sweep,
  member,
  throughLine,
  lineCheck,
}: ExampleRecords): Readonly<Record<string, ExampleCall>> {
  const edit = { method: 'PATCH', headers: { 'if-match': '*' } } as const;
  return {
    getLiveness: { url: '/livez' },
    getReadiness: { url: '/readyz' },
    getClub: { url: '/v1/club' },
    editClub: { ...edit, url: '/v1/club', body: { public_dashboard: true } },
    addMember: {
      method: 'POST',
      url: '/v1/members',
      body: { role: 'measurer', person: { name: 'Invented Member' } },
    },
    getMember: { url: `/v1/members/${member}` },
    editMember: {
      ...edit,
      url: `/v1/members/${member}`,
      body: { person: { name: 'Invented Steward' } },
    },
    listMembers: { url: '/v1/members' },
    listTokens: { url: '/v1/tokens' },
    listSites: { url: '/v1/sites' },
    getSite: { url: '/v1/sites/hilltop' },
    addSite: { method: 'POST', url: '/v1/sites', body: { key: 'quarry', name: 'Quarry' } },
    editSite: { ...edit, url: '/v1/sites/quarry', body: { elevation_m: 310 } },
    listAntennas: { url: '/v1/antennas?limit=2' },
    getAntenna: { url: '/v1/antennas/hilltop-20m' },
    addAntenna: {
      method: 'POST',
      url: '/v1/antennas',
      body: {
        key: 'quarry-20m',
        site: 'quarry',
        name: 'Quarry dipole',
        kind: 'dipole',
        design_bands: ['20m'],
        plan: 'iaru-r1',
      },
    },
    editAntenna: { ...edit, url: '/v1/antennas/quarry-20m', body: { max_swr: 1.5 } },
    listAnalyzers: { url: '/v1/analyzers' },
    getAnalyzer: { url: '/v1/analyzers/bench' },
    addAnalyzer: { method: 'POST', url: '/v1/analyzers', body: { key: 'loan', name: 'On loan' } },
    editAnalyzer: { ...edit, url: '/v1/analyzers/loan', body: { note: 'given back' } },
    uploadLoadCheck: {
      method: 'POST',
      url: '/v1/analyzers/loan/load-checks?load=50&file_name=load.s1p',
      body: '# MHz S RI R 50\n3.5 0.004 -0.001\n14 0.005 0.002\n28 0.003 0.004\n',
      headers: { 'content-type': 'application/octet-stream' },
    },
    listLoadChecks: { url: '/v1/analyzers/loan/load-checks' },
    listCables: { url: '/v1/cables' },
    addCable: {
      method: 'POST',
      url: '/v1/cables',
      body: {
        key: 'reel-75',
        name: 'Reel of 75 ohm foam coax',
        characteristic_ohm: 75,
        velocity_factor: 0.82,
        points: [
          { frequency_hz: 5_000_000, loss_db_per_100_m: 1.9 },
          { frequency_hz: 50_000_000, loss_db_per_100_m: 4.8 },
          { frequency_hz: 200_000_000, loss_db_per_100_m: 9.7 },
        ],
        source: 'sheet that came with the reel',
      },
    },
    getCable: { url: '/v1/cables/m17-74-rg213' },
    listLineChecks: { url: '/v1/antennas/boathouse-2m/line-checks?limit=1' },
    getLineCheck: { url: `/v1/antennas/boathouse-2m/line-checks/${lineCheck}` },
    uploadLineCheck: {
      method: 'POST',
      url: '/v1/antennas/quarry-20m/line-checks?far_end=open&cable=m17-74-rg213&known_length_m=12&file_name=line.s1p',
      body: sampleLineFile(),
      headers: { 'content-type': 'application/octet-stream' },
    },
    uploadSweep: {
      method: 'POST',
      url: '/v1/antennas/quarry-20m/sweeps?file_name=quarry.s1p&measured_at=2026-05-17T14:30:00Z',
      body: sampleFile,
      headers: { 'content-type': 'application/octet-stream' },
    },
    listSweeps: { url: '/v1/antennas/hilltop-20m/sweeps?limit=2' },
    getSweep: { url: `/v1/sweeps/${sweep}` },
    listSweepRevisions: { url: `/v1/sweeps/${sweep}/revisions` },
    correctSweep: {
      ...edit,
      url: `/v1/sweeps/${throughLine}`,
      body: { reason: 'It had begun to rain.', weather: 'rain' },
    },
    getSummary: { url: `/v1/sweeps/${throughLine}/summary` },
    addWork: {
      method: 'POST',
      url: '/v1/antennas/quarry-20m/work',
      body: { kind: 'trimmed', done_at: '2026-05-17T13:00:00Z', length_mm: 120, note: 'both ends' },
    },
    listWork: { url: '/v1/antennas/quarry-20m/work' },
    getHistory: { url: '/v1/antennas/hilltop-40m/history?limit=1' },
    compareSweeps: { url: `/v1/sweeps/${sweep}/compare/${sweep}` },
    listBaselines: { url: '/v1/antennas/hilltop-40m/baselines' },
    chooseBaseline: {
      method: 'POST',
      url: '/v1/antennas/quarry-20m/baselines',
      body: { era: 0, sweeps: [] },
    },
    listDueTests: { url: '/v1/due' },
    setTestInterval: { method: 'PATCH', url: '/v1/due', body: { interval_days: 365 } },
    followResonances: { url: '/v1/antennas/hilltop-40m/tracks?band=40m' },
    getDrift: { url: '/v1/antennas/hilltop-40m/drift' },
    getAgreement: { url: '/v1/analyzers/agreement' },
    addRound: {
      method: 'POST',
      url: '/v1/rounds',
      body: {
        name: 'Spring round',
        antenna: 'quarry-20m',
        analyzers: ['bench', 'handheld'],
        begins_at: '2026-04-01T00:00:00Z',
        ends_at: '2026-05-01T00:00:00Z',
      },
    },
    listRounds: { url: '/v1/rounds' },
    getAdvice: { url: `/v1/sweeps/${throughLine}/advice?power_w=50` },
    getUsable: { url: `/v1/sweeps/${sweep}/usable` },
    getSweepPoints: { url: `/v1/sweeps/${sweep}/points` },
    getDashboard: { url: '/v1/dashboard' },
    listPlans: { url: '/v1/plans' },
  };
}

/** Longer lists are cut in examples: the document is to be read. */
const longestList = 2;

/** Puts the real answers of the demo club into the document, as examples of its operations. */
export async function addExamples(
  document: OpenAPIV3_1.Document,
  app: App,
  token: string,
  records: ExampleRecords,
): Promise<void> {
  const operations = operationsOf(document);
  for (const [operationId, call] of Object.entries(calls(records))) {
    const operation = operations.find((candidate) => candidate.operationId === operationId);
    if (operation === undefined) throw new Error(`There is no operation ${operationId}.`);
    await addExample(operation, app, token, call);
  }
}

async function addExample(
  operation: OpenAPIV3_1.OperationObject,
  app: App,
  token: string,
  { method = 'GET', url, body, headers }: ExampleCall,
): Promise<void> {
  const answer = await app.inject({
    method,
    url,
    headers: { authorization: `Bearer ${token}`, ...headers },
    ...(body === undefined ? {} : { payload: body }),
  });
  const response = operation.responses?.[answer.statusCode];
  const media = mediaOf(response, 'application/json');
  if (answer.statusCode >= 300 || media === undefined) {
    throw new Error(`${method} ${url} answered ${answer.statusCode}: ${answer.body}`);
  }
  media.example = shortened(answer.json());
  const sent = mediaOf(operation.requestBody, 'application/json');
  if (sent !== undefined && typeof body === 'object') sent.example = body;
}

function mediaOf(
  part:
    | OpenAPIV3_1.ResponseObject
    | OpenAPIV3_1.RequestBodyObject
    | OpenAPIV3_1.ReferenceObject
    | undefined,
  type: string,
): OpenAPIV3_1.MediaTypeObject | undefined {
  return part !== undefined && 'content' in part ? part.content?.[type] : undefined;
}

/** Cuts lists, and digits that another machine's arithmetic might not repeat. */
function shortened(value: unknown): unknown {
  if (typeof value === 'number' && !Number.isInteger(value)) return Number(value.toPrecision(7));
  if (Array.isArray(value)) return value.slice(0, longestList).map(shortened);
  if (typeof value !== 'object' || value === null) return value;
  return Object.fromEntries(Object.entries(value).map(([name, inner]) => [name, shortened(inner)]));
}
