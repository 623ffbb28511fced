import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { InjectOptions, LightMyRequestResponse } from 'fastify';
import type { OpenAPIV3_1 } from 'openapi-types';
import type { DestinationStream } from 'pino';
import { defaultReadLimits, type ReadLimits } from '../../core/formats/read-types.ts';
import { buildApp } from '../../server/app.ts';
import type { RequestLimits } from '../../server/auth/request-limits.ts';
import { addFirstClub } from '../../server/first-run.ts';
import type { App } from '../../server/http/app-type.ts';
import { makeIdSource } from '../../server/ids.ts';
import { ingest } from '../../server/ingest.ts';
import { makeLog } from '../../server/log.ts';
import type { Service } from '../../server/service.ts';
import type { Actor, Store } from '../../server/store/port.ts';
import { openSqliteStore } from '../../server/store/sqlite/open.ts';
import { assertDocumented } from './contract.ts';
import { Random } from './random.ts';

export const testUrl = 'http://ledger.example';

export interface TestApp {
  readonly app: App;
  readonly service: Service;
  readonly actor: Actor;
  readonly token: string;
  /** Time stands still unless a test moves it. */
  readonly clock: { ms: number };
  /** Sends a request with the token, and holds the answer against the document. */
  call(request: InjectOptions & { readonly url: string }): Promise<LightMyRequestResponse>;
  close(): Promise<void>;
}

interface TestAppOptions {
  readonly limits?: Partial<ReadLimits>;
  /** Without them nothing is counted. */
  readonly requestLimits?: RequestLimits;
  readonly trustedProxies?: readonly string[];
  /** Puts something between the routes and the store, to make it fail. */
  readonly around?: (store: Store) => Store;
  readonly heartbeatMs?: number;
  readonly privateWebhooks?: boolean;
  readonly logTo?: DestinationStream;
}

/** The whole service on a store of its own in a temporary folder, with time and ids that repeat. */
export async function makeTestApp(options: TestAppOptions = {}): Promise<TestApp> {
  const folder = mkdtempSync(join(tmpdir(), 'sweep-ledger-'));
  const inner = await openSqliteStore({ path: join(folder, 'ledger.sqlite') });
  const clock = { ms: Date.parse('2026-06-01T12:00:00Z') };
  const now = () => clock.ms;
  const randomBytes = repeatableBytes();
  const service: Service = {
    store: options.around?.(inner) ?? inner,
    now,
    newId: makeIdSource(now, randomBytes),
    publicUrl: testUrl,
    ingest: async (incoming) => ingest(incoming),
    limits: { ...defaultReadLimits, ...options.limits },
    requestLimits: options.requestLimits ?? { perAddress: 0, perToken: 0 },
    trustedProxies: options.trustedProxies ?? [],
    privateWebhooks: options.privateWebhooks ?? false,
    ...(options.heartbeatMs === undefined ? {} : { heartbeatMs: options.heartbeatMs }),
  };
  const log = options.logTo === undefined ? makeLog('silent') : makeLog('trace', options.logTo);
  const app = await buildApp({ service, log, document: emptyDocument });
  const club = { key: 'test-club', name: 'Test club', invented: true };
  const firstRun = await addFirstClub({ ...service, store: inner }, randomBytes, club);
  if (firstRun === null) throw new Error('The new store has a club already.');
  const { actor, token } = firstRun;
  return {
    app,
    service,
    actor,
    token,
    clock,
    call: async (request) => {
      const headers = { authorization: `Bearer ${token}`, ...request.headers };
      const answer = await app.inject({ ...request, headers });
      assertDocumented(request.method ?? 'GET', request.url, answer);
      return answer;
    },
    close: async () => {
      await app.close();
      await inner.close();
      rmSync(folder, { recursive: true, force: true });
    },
  };
}

const emptyDocument: OpenAPIV3_1.Document = {
  openapi: '3.1.0',
  info: { title: 'Stands for the document', version: '1' },
  paths: {},
};

/** Bytes that look random and are the same in every run. */
function repeatableBytes(): (count: number) => Uint8Array {
  const random = new Random(20_260_601);
  return (count) => Uint8Array.from({ length: count }, () => random.word() & 0xff);
}
