import type { PageRequest } from '../port.ts';
import type { Connection } from './connection.ts';
import {
  type ClubRow,
  clubColumns,
  type KnownTokenRow,
  knownToken,
  type MemberRow,
  memberColumns,
  type TokenRow,
  tokenColumns,
} from './people-rows.ts';

/** The clauses of the lists of people; a test holds each against its query plan. */
export const peopleListQueries = {
  members: `SELECT ${memberColumns}
    WHERE member.club_id = @clubId AND member.id > @id ORDER BY member.id LIMIT @limit`,
  tokens: `SELECT ${tokenColumns} FROM token
    WHERE club_id = @clubId AND id > @id ORDER BY id LIMIT @limit`,
  tokensOfMember: `SELECT ${tokenColumns} FROM token
    WHERE club_id = @clubId AND member_id = @memberId AND id > @id ORDER BY id LIMIT @limit`,
} as const;

/** What is asked about people, their tokens and the club. */
export class PeopleReader {
  private readonly prepared;

  constructor(connection: Connection) {
    this.prepared = prepareAll(connection);
  }

  club(clubId: string): ClubRow | null {
    return this.prepared.club.get(clubId) ?? null;
  }

  member(clubId: string, id: string): MemberRow | null {
    return this.prepared.member.get(clubId, id) ?? null;
  }

  /** One row more than the page holds, if there is one; so in every list. */
  members(clubId: string, { limit, after }: PageRequest): MemberRow[] {
    return this.prepared.members.all({ clubId, id: after?.[1] ?? '', limit: limit + 1 });
  }

  knownToken(secretSha256: Uint8Array): KnownTokenRow | null {
    return this.prepared.knownToken.get(secretSha256) ?? null;
  }

  token(clubId: string, id: string): TokenRow | null {
    return this.prepared.token.get(clubId, id) ?? null;
  }

  tokens(clubId: string, memberId: string | null, { limit, after }: PageRequest): TokenRow[] {
    const asked = { clubId, id: after?.[1] ?? '', limit: limit + 1 };
    if (memberId === null) return this.prepared.tokens.all(asked);
    return this.prepared.tokensOfMember.all({ ...asked, memberId });
  }
}

function prepareAll(connection: Connection) {
  const prepare = <Row>(sql: string) => connection.prepare<unknown[], Row>(sql);
  return {
    club: prepare<ClubRow>(`SELECT ${clubColumns} FROM club WHERE id = ?`),
    member: prepare<MemberRow>(
      `SELECT ${memberColumns} WHERE member.club_id = ? AND member.id = ?`,
    ),
    members: prepare<MemberRow>(peopleListQueries.members),
    knownToken: prepare<KnownTokenRow>(knownToken),
    token: prepare<TokenRow>(`SELECT ${tokenColumns} FROM token WHERE club_id = ? AND id = ?`),
    tokens: prepare<TokenRow>(peopleListQueries.tokens),
    tokensOfMember: prepare<TokenRow>(peopleListQueries.tokensOfMember),
  };
}
