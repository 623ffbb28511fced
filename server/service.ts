import type { ReadLimits } from '../core/formats/read-types.ts';
import type { RequestLimits } from './auth/request-limits.ts';
import type { Clock } from './ids.ts';
import type { Ingest } from './ingest-pool.ts';
import type { Store } from './store/port.ts';

/** What the routes are given to work with: storage, time and ids, and the settings they need. */
export interface Service {
  readonly store: Store;
  readonly now: Clock;
  readonly newId: () => string;
  /** Without a slash at its end. */
  readonly publicUrl: string;
  readonly limits: ReadLimits;
  readonly requestLimits: RequestLimits;
  /** Addresses of proxies whose `X-Forwarded-For` is believed. */
  readonly trustedProxies: readonly string[];
  /** Reads and analyses a file on its way in. */
  readonly ingest: Ingest;
  /** Whether webhooks may go to private addresses, and by http; not if left out. */
  readonly privateWebhooks?: boolean;
  /** How often an open stream of events is shown to live; 15 seconds if left out. */
  readonly heartbeatMs?: number;
  /** When the newest good backup was begun, ms since 1970; null if there is none or none are made. */
  readonly lastBackupAt?: () => number | null;
}

/** The present time as it is stored and sent: RFC 3339, UTC, milliseconds. */
export function timestamp(now: Clock): string {
  return new Date(now()).toISOString();
}
