import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { ledgerPath } from '../../../server/store/ledger-path.ts';
import { Random } from '../../support/random.ts';
import {
  addTestAntenna,
  type BuiltService,
  end,
  freePort,
  startService,
  tokenOf,
} from '../built-service.ts';
import { databaseFaults, doubledUploads, lostUploads, readLedger, sweepsIn } from './check.ts';

export interface CrashOutcome {
  readonly kills: number;
  readonly acknowledged: number;
  readonly sweeps: number;
  /** Everything that was not as it must be, in words. */
  readonly faults: readonly string[];
}

const client = new URL('./client.ts', import.meta.url).pathname;

/**
 * Kills the built service outright again and again while a client uploads, and holds what it has
 * after each restart against what the client was told. Every fourth time it is killed while it
 * starts, else some random time after it went on acknowledging.
 */
export async function killAgainAndAgain(
  folder: string,
  kills: number,
  seed: number,
  tell: (line: string) => void = () => {},
): Promise<CrashOutcome> {
  const random = new Random(seed);
  const port = await freePort();
  const ledger = join(folder, 'client-ledger');
  writeFileSync(ledger, '');
  const path = ledgerPath(folder);
  let service = startService(folder, port);
  await service.listening;
  const { url } = service;
  const token = tokenOf(service);
  await addTestAntenna(url, token);
  const uploading = spawn(process.execPath, ['--import', 'tsx', client, url, token, ledger], {
    stdio: ['ignore', 'inherit', 'inherit'],
  });
  const faults: string[] = [];
  let checked = 0;
  try {
    for (let kill = 1; kill <= kills; kill++) {
      if (kill % 4 === 0) await killWhileStarting(service, random, folder, port);
      else await killWhileUploading(service, random, ledger, () => uploading.exitCode);
      service = startService(folder, port);
      await service.listening;
      // The client rests meanwhile, so that its ledger stands still.
      uploading.kill('SIGSTOP');
      const acknowledged = readLedger(ledger);
      faults.push(...(await lostUploads(url, token, acknowledged.slice(checked))));
      faults.push(...databaseFaults(path));
      checked = acknowledged.length;
      uploading.kill('SIGCONT');
      tell(`kill ${kill}: ${checked} acknowledged, ${faults.length} faults`);
    }
    const stopped = once(uploading, 'exit');
    uploading.kill('SIGKILL');
    await stopped;
    const acknowledged = readLedger(ledger);
    faults.push(...(await lostUploads(url, token, acknowledged)));
    const sweeps = sweepsIn(path);
    faults.push(...(await doubledUploads(url, token, acknowledged)));
    if (sweepsIn(path) !== sweeps) faults.push('sending again made more records');
    return { kills, acknowledged: acknowledged.length, sweeps, faults };
  } finally {
    uploading.kill('SIGKILL');
    await end(service, 'SIGKILL');
  }
}

async function killWhileUploading(
  service: BuiltService,
  random: Random,
  ledger: string,
  clientExit: () => number | null,
): Promise<void> {
  const before = readLedger(ledger).length;
  while (readLedger(ledger).length === before) {
    if (clientExit() !== null) throw new Error(`The client ended with ${clientExit()}.`);
    await pause(5);
  }
  await pause((random.word() % 150) + 1);
  await end(service, 'SIGKILL');
}

/** Kills it, and its successor while that starts. */
async function killWhileStarting(
  service: BuiltService,
  random: Random,
  folder: string,
  port: number,
): Promise<void> {
  await end(service, 'SIGKILL');
  const starting = startService(folder, port);
  await pause(200 + (random.word() % 600));
  await end(starting, 'SIGKILL');
}
