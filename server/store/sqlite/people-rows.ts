import type { Role } from '../../rights.ts';
import type { ClubState, KnownToken, MemberRecord, MemberToken } from '../people.ts';

export type KnownTokenRow = Omit<KnownToken, 'scopes'> & { readonly scopes: string | null };
export type TokenRow = Omit<MemberToken, 'scopes'> & { readonly scopes: string | null };

/** The token of a hash, with the role of its member. */
export const knownToken = `SELECT token.id AS id, token.club_id AS clubId, member_id AS memberId, role, scopes,
    token.created_at AS createdAt, expires_at AS expiresAt, last_used_at AS lastUsedAt
  FROM token JOIN member ON member.club_id = token.club_id AND member.id = member_id
  WHERE secret_sha256 = ? AND revoked_at IS NULL AND active = 1`;

export const tokenColumns = `id, club_id AS clubId, member_id AS memberId, label, scopes, created_at AS createdAt,
  expires_at AS expiresAt, revoked_at AS revokedAt, last_used_at AS lastUsedAt`;

export interface MemberRow {
  readonly id: string;
  readonly clubId: string;
  readonly revision: number;
  readonly role: Role;
  readonly active: number;
  readonly pseudonym: string;
  readonly shownAs: 'name' | 'pseudonym';
  readonly createdAt: string;
  readonly updatedAt: string;
  readonly erasedAt: string | null;
  readonly name: string | null;
  readonly callSign: string | null;
  readonly contact: string | null;
}

/** Columns and tables of a `MemberRow`, for SELECT. */
export const memberColumns = `member.id AS id, member.club_id AS clubId, revision, role, active, pseudonym,
  shown_as AS shownAs, created_at AS createdAt, updated_at AS updatedAt, erased_at AS erasedAt,
  name, call_sign AS callSign, contact
  FROM member LEFT JOIN person ON person.club_id = member.club_id AND person.member_id = member.id`;

export interface ClubRow {
  readonly id: string;
  readonly key: string;
  readonly name: string;
  readonly invented: number;
  readonly revision: number;
  readonly createdAt: string;
  readonly updatedAt: string;
  readonly publicDashboard: number;
}

/** Columns of a `ClubRow`, for SELECT and RETURNING. */
export const clubColumns = `id, key, name, invented, revision, created_at AS createdAt, updated_at AS updatedAt,
  public_dashboard AS publicDashboard`;

export function toKnownToken(row: KnownTokenRow): KnownToken {
  return { ...row, scopes: row.scopes === null ? null : JSON.parse(row.scopes) };
}

export function toMemberToken(row: TokenRow): MemberToken {
  return { ...row, scopes: row.scopes === null ? null : JSON.parse(row.scopes) };
}

export function toMemberRecord(row: MemberRow): MemberRecord {
  const { role, active, shownAs, name, callSign, contact, ...record } = row;
  const person = name === null ? null : { name, callSign, contact };
  return { ...record, facts: { role, active: active === 1, shownAs, person } };
}

export function toClubState({ name, invented, publicDashboard, ...row }: ClubRow): ClubState {
  return {
    ...row,
    invented: invented === 1,
    facts: { name, publicDashboard: publicDashboard === 1 },
  };
}
