import type { FastifyBaseLogger } from 'fastify';
import { type Service, timestamp } from '../service.ts';
import type { KnownToken } from '../store/people.ts';

const everyMs = 5 * 60 * 1000;

/**
 * Makes what notes when a token was last used: at most every five minutes, beside the request and
 * never in its way. A failure is logged and tried again five minutes later.
 */
export function noteUses({
  store,
  now,
}: Service): (token: KnownToken, log: FastifyBaseLogger) => void {
  /** Of the notes that are on their way or that failed; what the store has is in the token. */
  const notedAtMs = new Map<string, number>();
  return ({ id, clubId, lastUsedAt }, log) => {
    const nowMs = now();
    const stored = lastUsedAt === null ? Number.NEGATIVE_INFINITY : Date.parse(lastUsedAt);
    const noted = notedAtMs.get(id) ?? Number.NEGATIVE_INFINITY;
    if (nowMs - Math.max(stored, noted) < everyMs) return;
    notedAtMs.set(id, nowMs);
    store.people.noteTokenUse(clubId, id, timestamp(now)).catch((error: unknown) => {
      log.warn({ err: error }, 'the use of a token was not noted');
    });
  };
}
