import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { defaultReadLimits } from '../../core/formats/read-types.ts';
import { buildApp } from '../app.ts';
import { demoClub } from '../demo/demo-club.ts';
import { seededStream } from '../demo/random.ts';
import { addFirstClub } from '../first-run.ts';
import { makeIdSource } from '../ids.ts';
import { ingest } from '../ingest.ts';
import { loadDemo } from '../load-demo.ts';
import { makeLog } from '../log.ts';
import { projectRoot } from '../project-files.ts';
import type { Service } from '../service.ts';
import { openSqliteStore } from '../store/sqlite/open.ts';
import { documentOf } from './document.ts';
import { addExamples } from './examples.ts';

// Writes openapi/openapi.json from the routes and the demo club; with --check it only compares.
const path = join(projectRoot(), 'openapi', 'openapi.json');
const made = await makeDocument();
if (process.argv.includes('--check')) {
  if (readFileSync(path, 'utf8') !== made) {
    process.stderr.write('openapi/openapi.json is not what the routes make: npm run openapi\n');
    process.exitCode = 1;
  }
} else {
  writeFileSync(path, made);
}

/** The same text every time: clock and random bytes stand still. */
async function makeDocument(): Promise<string> {
  const folder = mkdtempSync(join(tmpdir(), 'sweep-ledger-openapi-'));
  const now = () => Date.parse('2026-06-01T12:00:00Z');
  const { uniform } = seededStream('openapi');
  const randomBytes = (count: number) =>
    Uint8Array.from({ length: count }, () => Math.floor(uniform() * 256));
  const service: Service = {
    store: await openSqliteStore({ path: join(folder, 'ledger.sqlite') }),
    now,
    newId: makeIdSource(now, randomBytes),
    publicUrl: 'http://127.0.0.1:8080',
    requestLimits: { perAddress: 0, perToken: 0 },
    trustedProxies: [],
    ingest: async (incoming) => ingest(incoming),
    limits: defaultReadLimits,
  };
  const app = await buildApp({ service, log: makeLog('silent'), document: null });
  await app.ready();
  const document = documentOf(app);
  const demo = demoClub();
  const first = await addFirstClub(service, randomBytes, demo);
  if (first === null) throw new Error('The new store has a club already.');
  await loadDemo(service, first.actor, demo);
  const newestOf = async (list: string) => {
    const headers = { authorization: `Bearer ${first.token}` };
    return (await app.inject({ url: `${list}?limit=1`, headers })).json().items[0].id;
  };
  await addExamples(document, app, first.token, {
    member: first.actor.memberId,
    sweep: await newestOf('/v1/antennas/hilltop-20m/sweeps'),
    throughLine: await newestOf('/v1/antennas/boathouse-2m/sweeps'),
    lineCheck: await newestOf('/v1/antennas/boathouse-2m/line-checks'),
  });
  await app.close();
  await service.store.close();
  rmSync(folder, { recursive: true });
  return `${JSON.stringify(document, null, 2)}\n`;
}
