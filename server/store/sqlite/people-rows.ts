import type { KnownToken } from '../people.ts';

export type KnownTokenRow = Omit<KnownToken, 'scopes'> & { readonly scopes: string | null };

/** The token of a hash, with the role of its member. */
export const knownToken = `SELECT token.id AS id, token.club_id AS clubId, member_id AS memberId, role, scopes,
    token.created_at AS createdAt, expires_at AS expiresAt, last_used_at AS lastUsedAt
  FROM token JOIN member ON member.club_id = token.club_id AND member.id = member_id
  WHERE secret_sha256 = ? AND revoked_at IS NULL AND active = 1`;

export function toKnownToken(row: KnownTokenRow): KnownToken {
  return { ...row, scopes: row.scopes === null ? null : JSON.parse(row.scopes) };
}
