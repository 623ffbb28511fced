import type {
  ChangeMemberOutcome,
  ClubFacts,
  ClubState,
  MemberFacts,
  MemberRecord,
  MemberToken,
  PeopleStore,
} from '../people.ts';
import type { Actor, Page, PageRequest } from '../port.ts';
import { pageOf } from './page-of.ts';
import type { ChangedMember, NewToken } from './people-acts.ts';
import type { PeopleReader } from './people-reader.ts';
import { toClubState, toMemberRecord, toMemberToken } from './people-rows.ts';
import type { Writer } from './writer.ts';

type Read = <Row>(ask: (reader: PeopleReader) => Row) => Row;

/** People, their tokens and the club, over the store's reader and writer. */
export class SqlitePeople implements PeopleStore {
  private readonly read: Read;
  private readonly writer: Writer;

  constructor(read: Read, writer: Writer) {
    this.read = read;
    this.writer = writer;
  }

  async findClub(clubId: string): Promise<ClubState | null> {
    const row = this.read((reader) => reader.club(clubId));
    return row === null ? null : toClubState(row);
  }

  async editClub(actor: Actor, revision: number, facts: ClubFacts): Promise<ClubState> {
    return toClubState(await this.writer.run('editClub', actor, revision, facts));
  }

  async addMember(
    actor: Actor,
    { id, facts }: { readonly id: string; readonly facts: MemberFacts },
  ): Promise<MemberRecord> {
    return toMemberRecord(await this.writer.run('addMember', actor, id, facts));
  }

  async findMember(clubId: string, id: string): Promise<MemberRecord | null> {
    const row = this.read((reader) => reader.member(clubId, id));
    return row === null ? null : toMemberRecord(row);
  }

  async listMembers(clubId: string, page: PageRequest): Promise<Page<MemberRecord>> {
    const rows = this.read((reader) => reader.members(clubId, page));
    return pageOf(rows, page, toMemberRecord, keyById);
  }

  async editMember(
    actor: Actor,
    id: string,
    revision: number,
    facts: MemberFacts,
  ): Promise<ChangeMemberOutcome> {
    return toOutcome(await this.writer.run('editMember', actor, id, revision, facts));
  }

  async eraseMember(actor: Actor, id: string): Promise<ChangeMemberOutcome> {
    return toOutcome(await this.writer.run('eraseMember', actor, id));
  }

  async addToken(
    actor: Actor,
    token: NewToken,
    secretSha256: Uint8Array,
  ): Promise<MemberToken | null> {
    const row = await this.writer.run('addToken', actor, token, secretSha256);
    return row === null ? null : toMemberToken(row);
  }

  async listTokens(
    clubId: string,
    memberId: string | null,
    page: PageRequest,
  ): Promise<Page<MemberToken>> {
    const rows = this.read((reader) => reader.tokens(clubId, memberId, page));
    return pageOf(rows, page, toMemberToken, keyById);
  }

  async findMemberToken(clubId: string, id: string): Promise<MemberToken | null> {
    const row = this.read((reader) => reader.token(clubId, id));
    return row === null ? null : toMemberToken(row);
  }

  async revokeToken(actor: Actor, id: string): Promise<void> {
    await this.writer.run('revokeToken', actor, id);
  }

  async noteTokenUse(clubId: string, id: string, at: string): Promise<void> {
    await this.writer.run('noteTokenUse', clubId, id, at);
  }
}

function keyById({ id }: { readonly id: string }): readonly [string, string] {
  return [id, id];
}

function toOutcome(changed: ChangedMember): ChangeMemberOutcome {
  if (changed.outcome !== 'changed') return { outcome: changed.outcome };
  return { outcome: 'changed', record: toMemberRecord(changed.row) };
}
