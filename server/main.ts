import { randomBytes } from 'node:crypto';
import { mkdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import type { OpenAPIV3_1 } from 'openapi-types';
import { defaultReadLimits } from '../core/formats/read-types.ts';
import { buildApp } from './app.ts';
import { type Config, ConfigError, httpUrl, readConfig } from './config.ts';
import { demoClub } from './demo/demo-club.ts';
import { addFirstClub } from './first-run.ts';
import type { App } from './http/app-type.ts';
import { makeIdSource } from './ids.ts';
import { loadDemo } from './load-demo.ts';
import { makeLog } from './log.ts';
import { projectRoot } from './project-files.ts';
import type { Service } from './service.ts';
import { openSqliteStore } from './store/sqlite/open.ts';
import { firstSteps } from './welcome.ts';

async function main(): Promise<void> {
  const config = readConfig(process.env);
  const service = await openService(config);
  const log = makeLog(config.logLevel);
  const app = await buildApp({ service, log, document: readDocument() });
  closeOnSignal(app, service, config);
  await firstRun(service, config);
  await app.listen({ host: config.host, port: config.port });
  say(`Sweep Ledger listens on ${listeningUrl(app, config)} (documentation: /docs).\n`);
}

async function openService(config: Config): Promise<Service> {
  mkdirSync(config.dataDir, { recursive: true, mode: 0o700 });
  return {
    store: await openSqliteStore({ path: join(config.dataDir, 'ledger.sqlite') }),
    now: Date.now,
    newId: makeIdSource(Date.now, randomBytes),
    publicUrl: config.publicUrl,
    limits: { ...defaultReadLimits, maxBytes: config.maxUploadBytes, maxPoints: config.maxPoints },
  };
}

function readDocument(): OpenAPIV3_1.Document {
  return JSON.parse(readFileSync(join(projectRoot(), 'openapi', 'openapi.json'), 'utf8'));
}

/** Makes the club and shows its token, before anything that could fail and lose it. */
async function firstRun(service: Service, config: Config): Promise<void> {
  const demo = config.demo ? demoClub() : null;
  const club = demo ?? { key: 'club', name: config.clubName, invented: false };
  const first = await addFirstClub(service, randomBytes, club);
  if (first === null) return;
  say(firstSteps(config, first.token));
  if (demo !== null) await loadDemo(service, first.actor, demo);
}

function listeningUrl(app: App, config: Config): string {
  const address = app.server.address();
  const port = address === null || typeof address === 'string' ? config.port : address.port;
  return httpUrl(config.host, port);
}

/**
 * On SIGTERM or SIGINT: takes no new connections, lets running requests end, then flushes and closes
 * the store. Connections that are still open at the deadline are cut.
 */
function closeOnSignal(app: App, service: Service, config: Config): void {
  let closing = false;
  const close = async (signal: NodeJS.Signals) => {
    if (closing) return;
    closing = true;
    app.log.info({ signal }, 'closing');
    const deadline = setTimeout(
      () => app.server.closeAllConnections(),
      config.shutdownSeconds * 1000,
    );
    await app.close();
    clearTimeout(deadline);
    await service.store.close();
    app.log.info('closed');
  };
  for (const signal of ['SIGTERM', 'SIGINT'] as const) {
    process.on(signal, () => {
      close(signal).catch((error: unknown) => {
        app.log.fatal({ err: error }, 'closing failed');
        process.exit(1);
      });
    });
  }
}

function say(text: string): void {
  process.stdout.write(text);
}

main().catch((error: unknown) => {
  const fault =
    error instanceof ConfigError || !(error instanceof Error) ? String(error) : error.stack;
  process.stderr.write(`${fault}\n`);
  process.exit(1);
});
