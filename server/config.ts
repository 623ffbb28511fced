import { z } from 'zod';
import type { RequestLimits } from './auth/request-limits.ts';

/** Environment text: an empty variable counts as not set, so that `PORT= npm start` works. */
function setting<Schema extends z.ZodType>(schema: Schema) {
  return z.preprocess((text) => (text === '' ? undefined : text), schema);
}

const wholeNumber = (low: number, high: number) => z.coerce.number().int().min(low).max(high);

/**
 * Every setting of the service, read from the environment. README.md documents each one with its
 * default; a test holds the two against each other.
 */
export const configSchema = z.object({
  HOST: setting(z.string().default('127.0.0.1')),
  PORT: setting(wholeNumber(0, 65535).default(8080)),
  PUBLIC_URL: setting(z.url({ protocol: /^https?$/ }).optional()),
  DATA_DIR: setting(z.string().default('data')),
  CLUB_NAME: setting(z.string().min(1).max(100).default('Our club')),
  DEMO: setting(z.enum(['on', 'off']).default('on')),
  LOG_LEVEL: setting(
    z.enum(['fatal', 'error', 'warn', 'info', 'debug', 'trace', 'silent']).default('info'),
  ),
  MAX_UPLOAD_BYTES: setting(wholeNumber(1024, 64 * 1024 * 1024).default(16 * 1024 * 1024)),
  MAX_POINTS: setting(wholeNumber(1, 1_000_000).default(100_001)),
  REQUESTS_PER_MINUTE_ADDRESS: setting(wholeNumber(0, 10_000_000).default(6000)),
  REQUESTS_PER_MINUTE_TOKEN: setting(wholeNumber(0, 10_000_000).default(3000)),
  TRUSTED_PROXIES: setting(z.string().max(1000).optional()),
  DISK_RESERVE_BYTES: setting(wholeNumber(0, 2 ** 40).default(64 * 1024 * 1024)),
  BACKUP_EVERY_HOURS: setting(wholeNumber(0, 24 * 366).default(24)),
  BACKUP_KEEP: setting(wholeNumber(1, 1000).default(7)),
  PRIVATE_WEBHOOKS: setting(z.enum(['on', 'off']).default('off')),
  SHUTDOWN_SECONDS: setting(wholeNumber(1, 60).default(8)),
});

export interface Config {
  readonly host: string;
  readonly port: number;
  /** Without a slash at its end. */
  readonly publicUrl: string;
  readonly dataDir: string;
  readonly clubName: string;
  readonly demo: boolean;
  readonly logLevel: string;
  readonly maxUploadBytes: number;
  readonly maxPoints: number;
  readonly requestLimits: RequestLimits;
  readonly trustedProxies: readonly string[];
  /** Uploads are refused while the disk has less than this free. */
  readonly diskReserveBytes: number;
  /** 0: none are made. */
  readonly backupEveryHours: number;
  readonly backupKeep: number;
  /** Whether webhooks may go to private addresses, and by http. */
  readonly privateWebhooks: boolean;
  readonly shutdownSeconds: number;
}

/** Thrown when the environment does not make a configuration; the message lists every fault. */
export class ConfigError extends Error {
  override readonly name = 'ConfigError';
}

/** Reads the configuration from an environment and freezes it. Throws `ConfigError`. */
export function readConfig(environment: Readonly<Record<string, string | undefined>>): Config {
  const parsed = configSchema.safeParse(environment);
  if (!parsed.success) {
    const faults = parsed.error.issues.map((issue) => `${issue.path.join('.')}: ${issue.message}`);
    throw new ConfigError(`The configuration cannot be used.\n${faults.join('\n')}`);
  }
  const settings = parsed.data;
  if (settings.PORT === 0 && settings.PUBLIC_URL === undefined) {
    throw new ConfigError('PORT=0 takes any free port, so PUBLIC_URL must be set as well.');
  }
  return Object.freeze({
    host: settings.HOST,
    port: settings.PORT,
    publicUrl: (settings.PUBLIC_URL ?? httpUrl(reachable(settings.HOST), settings.PORT)).replace(
      /\/+$/,
      '',
    ),
    dataDir: settings.DATA_DIR,
    clubName: settings.CLUB_NAME,
    demo: settings.DEMO === 'on',
    logLevel: settings.LOG_LEVEL,
    maxUploadBytes: settings.MAX_UPLOAD_BYTES,
    maxPoints: settings.MAX_POINTS,
    requestLimits: {
      perAddress: settings.REQUESTS_PER_MINUTE_ADDRESS,
      perToken: settings.REQUESTS_PER_MINUTE_TOKEN,
    },
    trustedProxies: (settings.TRUSTED_PROXIES ?? '')
      .split(',')
      .map((address) => address.trim())
      .filter((address) => address !== ''),
    diskReserveBytes: settings.DISK_RESERVE_BYTES,
    backupEveryHours: settings.BACKUP_EVERY_HOURS,
    backupKeep: settings.BACKUP_KEEP,
    privateWebhooks: settings.PRIVATE_WEBHOOKS === 'on',
    shutdownSeconds: settings.SHUTDOWN_SECONDS,
  });
}

/** A listener on all addresses is reached by one of them. */
function reachable(host: string): string {
  return host === '0.0.0.0' || host === '::' ? '127.0.0.1' : host;
}

/** The URL under which a local listener is reached; an IPv6 address gets its brackets. */
export function httpUrl(host: string, port: number): string {
  return `http://${host.includes(':') ? `[${host}]` : host}:${port}`;
}
