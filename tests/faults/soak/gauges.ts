import { readdirSync, readFileSync, statSync } from 'node:fs';
import { ledgerPath } from '../../../server/store/ledger-path.ts';

export interface Gauges {
  readonly minute: number;
  /** Memory that the process holds, MiB (VmRSS of proc(5)). */
  readonly residentMib: number;
  /** Open files and connections. */
  readonly handles: number;
  /** Size of the write-ahead log, MiB. */
  readonly logMib: number;
}

const mib = 1024 * 1024;

export function readGauges(pid: number, dataDir: string, minute: number): Gauges {
  const kib = /^VmRSS:\s+(\d+) kB$/m.exec(readFileSync(`/proc/${pid}/status`, 'utf8'))?.[1];
  if (kib === undefined) throw new Error(`Process ${pid} tells no VmRSS.`);
  return {
    minute,
    residentMib: Number(kib) / 1024,
    handles: readdirSync(`/proc/${pid}/fd`).length,
    logMib: statSync(`${ledgerPath(dataDir)}-wal`).size / mib,
  };
}
