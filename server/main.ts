import { randomBytes } from 'node:crypto';
import { mkdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import type { FastifyBaseLogger } from 'fastify';
import type { OpenAPIV3_1 } from 'openapi-types';
import { defaultReadLimits } from '../core/formats/read-types.ts';
import { buildApp } from './app.ts';
import { type BackupSchedule, scheduleBackups } from './backup-schedule.ts';
import { type Config, ConfigError, httpUrl, readConfig } from './config.ts';
import { demoClub } from './demo/demo-club.ts';
import { watchOverdue } from './events/overdue.ts';
import { addFirstClub } from './first-run.ts';
import { fillHistory } from './history/measured-rows.ts';
import type { App } from './http/app-type.ts';
import { makeIdSource } from './ids.ts';
import { IngestPool } from './ingest-pool.ts';
import { loadDemo } from './load-demo.ts';
import { makeLog } from './log.ts';
import { projectRoot } from './project-files.ts';
import type { Service } from './service.ts';
import { ledgerPath } from './store/ledger-path.ts';
import { openSqliteStore } from './store/sqlite/open.ts';
import { sendWebhooks } from './webhooks/start.ts';
import { firstSteps } from './welcome.ts';

async function main(): Promise<void> {
  const config = readConfig(process.env);
  const log = makeLog(config.logLevel);
  const pool = new IngestPool();
  const opened = await openService(config, pool);
  const backups = backupsOf(opened, log, config);
  const service = backups === null ? opened : { ...opened, lastBackupAt: backups.lastGoodAt };
  const app = await buildApp({ service, log, document: readDocument() });
  sendWebhooks(app, service);
  watchOverdue(app, service);
  closeOnSignal(app, service, config, backups, pool);
  await firstRun(service, config);
  await app.listen({ host: config.host, port: config.port });
  say(`Sweep Ledger listens on ${listeningUrl(app, config)} (documentation: /docs).\n`);
  fillHistory(service, () => !app.server.listening).catch((error: unknown) => {
    log.warn({ err: error }, 'measures of older sweeps are still to be made');
  });
  await backups?.makeIfDue();
}

async function openService(config: Config, { ingest }: IngestPool): Promise<Service> {
  mkdirSync(config.dataDir, { recursive: true, mode: 0o700 });
  return {
    store: await openSqliteStore({
      path: ledgerPath(config.dataDir),
      reserveBytes: config.diskReserveBytes,
    }),
    now: Date.now,
    newId: makeIdSource(Date.now, randomBytes),
    publicUrl: config.publicUrl,
    ingest,
    privateWebhooks: config.privateWebhooks,
    requestLimits: config.requestLimits,
    trustedProxies: config.trustedProxies,
    limits: { ...defaultReadLimits, maxBytes: config.maxUploadBytes, maxPoints: config.maxPoints },
  };
}

function backupsOf(
  { store, now }: Service,
  log: FastifyBaseLogger,
  { dataDir, backupEveryHours, backupKeep }: Config,
): BackupSchedule | null {
  if (backupEveryHours === 0) return null;
  const folder = join(dataDir, 'backups');
  return scheduleBackups(store, now, log, {
    folder,
    everyHours: backupEveryHours,
    keep: backupKeep,
  });
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
function closeOnSignal(
  app: App,
  service: Service,
  config: Config,
  backups: BackupSchedule | null,
  pool: IngestPool,
): void {
  let closing = false;
  const close = async (signal: NodeJS.Signals) => {
    if (closing) return;
    closing = true;
    backups?.stop();
    app.log.info({ signal }, 'closing');
    const deadline = setTimeout(
      () => app.server.closeAllConnections(),
      config.shutdownSeconds * 1000,
    );
    await app.close();
    clearTimeout(deadline);
    await pool.close();
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
