import { mkdirSync, readdirSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import type { FastifyBaseLogger } from 'fastify';
import type { Clock } from './ids.ts';
import type { Store } from './store/port.ts';

export interface BackupPlan {
  readonly folder: string;
  readonly everyHours: number;
  /** How many of the newest are kept. */
  readonly keep: number;
}

export interface BackupSchedule {
  /** When the newest good backup was begun, ms since 1970; null if there is none. */
  lastGoodAt(): number | null;
  /** Makes a backup if the newest is old enough, and removes those beyond `keep`. Never throws. */
  makeIfDue(): Promise<void>;
  /** Begins no more backups. */
  stop(): void;
}

const name = /^ledger-(\d{4})(\d\d)(\d\d)T(\d\d)(\d\d)(\d\d)Z\.sqlite$/;
const checkEveryMs = 10 * 60 * 1000;

/**
 * Makes verified backups into a folder at an interval, counted from the newest one there, so that a
 * restart neither skips nor repeats one. One that failed is tried again at the next look.
 */
export function scheduleBackups(
  store: Pick<Store, 'backup'>,
  now: Clock,
  log: Pick<FastifyBaseLogger, 'info' | 'error'>,
  { folder, everyHours, keep }: BackupPlan,
): BackupSchedule {
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  removeUnfinished(folder);
  let lastGoodAt = newestIn(folder);
  let running: Promise<void> | null = null;

  const make = async () => {
    const begunAt = now();
    const age = begunAt - (lastGoodAt ?? Number.NEGATIVE_INFINITY);
    // One of the future is of a clock that was wrong: it does not count.
    if (age >= 0 && age < everyHours * 3_600_000) return;
    try {
      const file = nameAt(begunAt);
      await store.backup(join(folder, file));
      lastGoodAt = begunAt;
      log.info({ file }, 'backup made');
      for (const old of backupsIn(folder).slice(0, -keep)) rmSync(join(folder, old));
    } catch (error) {
      log.error({ err: error }, 'backup failed');
    }
  };
  const makeIfDue = () => {
    running ??= make().finally(() => {
      running = null;
    });
    return running;
  };
  const timer = setInterval(makeIfDue, checkEveryMs);
  timer.unref();
  return {
    lastGoodAt: () => lastGoodAt,
    makeIfDue,
    stop: () => clearInterval(timer),
  };
}

/** The names of finished backups, oldest first. */
export function backupsIn(folder: string): readonly string[] {
  return readdirSync(folder)
    .filter((entry) => name.test(entry))
    .sort();
}

function newestIn(folder: string): number | null {
  const newest = backupsIn(folder).at(-1);
  return newest === undefined ? null : timeOf(newest);
}

/** A process that was killed leaves what it had begun. */
function removeUnfinished(folder: string): void {
  for (const entry of readdirSync(folder)) {
    if (/\.sqlite\.part(-journal)?$/.test(entry)) rmSync(join(folder, entry));
  }
}

function nameAt(ms: number): string {
  return `ledger-${new Date(ms).toISOString().slice(0, 19).replaceAll(/[-:]/g, '')}Z.sqlite`;
}

function timeOf(file: string): number {
  return Date.parse(file.replace(name, '$1-$2-$3T$4:$5:$6Z'));
}
