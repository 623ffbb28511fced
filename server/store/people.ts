import type { Right, Role } from '../rights.ts';
import type { Actor, Page, PageRequest } from './port.ts';

/** A token that is neither revoked nor of a member who has left, as a request is judged by it. */
export interface KnownToken {
  readonly id: string;
  readonly clubId: string;
  readonly memberId: string;
  readonly role: Role;
  /** Narrows the role; null: all that the role has. */
  readonly scopes: readonly Right[] | null;
  readonly createdAt: string;
  readonly expiresAt: string | null;
  readonly lastUsedAt: string | null;
}

/** A token as it is listed: its secret is not kept. */
export interface MemberToken {
  readonly id: string;
  readonly clubId: string;
  readonly memberId: string;
  readonly label: string;
  readonly scopes: readonly Right[] | null;
  readonly createdAt: string;
  readonly expiresAt: string | null;
  readonly revokedAt: string | null;
  /** To within five minutes. */
  readonly lastUsedAt: string | null;
}

/** All that tells who a member is; nothing else of it is kept anywhere. */
export interface Person {
  readonly name: string;
  readonly callSign: string | null;
  readonly contact: string | null;
}

export interface MemberFacts {
  readonly role: Role;
  /** False: the member has left, and no token of theirs is valid. */
  readonly active: boolean;
  readonly shownAs: 'name' | 'pseudonym';
  readonly person: Person | null;
}

export interface MemberRecord {
  readonly id: string;
  readonly clubId: string;
  readonly revision: number;
  /** Given by the store and never changed; all that an erased member leaves beside the id. */
  readonly pseudonym: string;
  readonly createdAt: string;
  readonly updatedAt: string;
  readonly erasedAt: string | null;
  readonly facts: MemberFacts;
}

/** `last-steward`: the club would have nobody left who could administer it. */
export type ChangeMemberOutcome =
  | { readonly outcome: 'changed'; readonly record: MemberRecord }
  | { readonly outcome: 'last-steward' | 'erased-before' };

export interface ClubFacts {
  readonly name: string;
  /** Whether anybody may see the dashboard without a token. */
  readonly publicDashboard: boolean;
}

export interface ClubState {
  readonly id: string;
  readonly key: string;
  readonly invented: boolean;
  readonly revision: number;
  readonly createdAt: string;
  readonly updatedAt: string;
  readonly facts: ClubFacts;
}

/** The part of the Store port that is about people, their tokens and the club itself. */
export interface PeopleStore {
  findClub(clubId: string): Promise<ClubState | null>;
  /** Throws `stale`. */
  editClub(actor: Actor, revision: number, facts: ClubFacts): Promise<ClubState>;

  addMember(
    actor: Actor,
    fresh: { readonly id: string; readonly facts: MemberFacts },
  ): Promise<MemberRecord>;
  findMember(clubId: string, id: string): Promise<MemberRecord | null>;
  /** In the order in which they were added. */
  listMembers(clubId: string, page: PageRequest): Promise<Page<MemberRecord>>;
  /** Throws `stale`. */
  editMember(
    actor: Actor,
    id: string,
    revision: number,
    facts: MemberFacts,
  ): Promise<ChangeMemberOutcome>;
  /** Deletes the person, revokes the tokens and blanks their labels; the member's id stays. */
  eraseMember(actor: Actor, id: string): Promise<ChangeMemberOutcome>;

  /** Null if the club has no active member of that id. */
  addToken(
    actor: Actor,
    token: Omit<MemberToken, 'clubId' | 'createdAt' | 'revokedAt' | 'lastUsedAt'>,
    secretSha256: Uint8Array,
  ): Promise<MemberToken | null>;
  /** In the order in which they were added; of one member or of all. */
  listTokens(
    clubId: string,
    memberId: string | null,
    page: PageRequest,
  ): Promise<Page<MemberToken>>;
  findMemberToken(clubId: string, id: string): Promise<MemberToken | null>;
  /** Revoking again changes nothing. */
  revokeToken(actor: Actor, id: string): Promise<void>;
  noteTokenUse(clubId: string, id: string, at: string): Promise<void>;
}
