import { Problem } from '../problems.ts';
import { type Right, rightsOf } from '../rights.ts';
import type { MemberRecord } from '../store/people.ts';
import type { Principal } from './bearer.ts';

const yearMs = 366 * 24 * 3600 * 1000;

interface Wish {
  readonly scopes: readonly Right[] | null | undefined;
  /** Null: never. Undefined: the default. */
  readonly expiresAt: string | null | undefined;
}

/**
 * What a new token may do and how long it lasts. A token that cannot administer makes none that may
 * do more or lasts longer than itself, so that one that leaked cannot renew itself. Throws
 * `implausible-fact`.
 */
export function newTokenTerms(
  maker: Principal,
  member: MemberRecord,
  wish: Wish,
  nowMs: number,
): { readonly scopes: readonly Right[] | null; readonly expiresAt: string | null } {
  const own = member.id === maker.memberId;
  const most = own ? maker.rights : rightsOf(member.facts.role);
  return {
    scopes: scopesWithin(most, rightsOf(member.facts.role), wish.scopes ?? null),
    expiresAt: expiryWithin(
      maker.rights.has('administer') ? null : maker.tokenExpiresAt,
      wish.expiresAt,
      nowMs,
    ),
  };
}

function scopesWithin(
  most: ReadonlySet<Right>,
  ofRole: ReadonlySet<Right>,
  wish: readonly Right[] | null,
): readonly Right[] | null {
  if (wish === null) return most.size === ofRole.size ? null : [...most];
  for (const [i, right] of wish.entries()) {
    if (most.has(right)) continue;
    const detail = `The right \`${right}\` is more than this token can be given.`;
    throw new Problem('implausible-fact', { errors: [{ detail, pointer: `#/scopes/${i}` }] });
  }
  return [...new Set(wish)];
}

function expiryWithin(
  latest: string | null,
  wish: string | null | undefined,
  nowMs: number,
): string | null {
  const refuse = (detail: string) =>
    new Problem('implausible-fact', { errors: [{ detail, pointer: '#/expires_at' }] });
  if (wish === undefined) {
    const inAYear = new Date(nowMs + yearMs).toISOString();
    return latest !== null && latest < inAYear ? latest : inAYear;
  }
  if (wish !== null && Date.parse(wish) <= nowMs) throw refuse('This time is over.');
  if (latest !== null && (wish === null || wish > latest)) {
    throw refuse(`The token that asks ends at ${latest}; it can make none that lasts longer.`);
  }
  return wish;
}
