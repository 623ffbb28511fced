import type { EventKind } from '../events.ts';
import type { ClubFacts, MemberFacts, MemberToken, Person } from '../people.ts';
import { type Actor, StoreError } from '../port.ts';
import type { Connection } from './connection.ts';
import {
  type ClubRow,
  clubColumns,
  type MemberRow,
  memberColumns,
  type TokenRow,
  tokenColumns,
} from './people-rows.ts';

export type ChangedMember =
  | { readonly outcome: 'changed'; readonly row: MemberRow }
  | { readonly outcome: 'last-steward' | 'erased-before' };

export type NewToken = Omit<MemberToken, 'clubId' | 'createdAt' | 'revokedAt' | 'lastUsedAt'>;

/** What the writer does about people, each whole or not at all. */
export interface PeopleActs {
  editClub(actor: Actor, revision: number, facts: ClubFacts): ClubRow;
  addMember(actor: Actor, id: string, facts: MemberFacts): MemberRow;
  editMember(actor: Actor, id: string, revision: number, facts: MemberFacts): ChangedMember;
  eraseMember(actor: Actor, id: string): ChangedMember;
  addToken(actor: Actor, token: NewToken, secretSha256: Uint8Array): TokenRow | null;
  revokeToken(actor: Actor, id: string): null;
  noteTokenUse(clubId: string, id: string, at: string): null;
}

/** Writes that something happened to a subject. */
export type WriteEvent = (actor: Actor, kind: EventKind, subjectId: string) => void;

/** Prepares the acts on the writer's connection. */
export function peopleActs(connection: Connection, writeEvent: WriteEvent): PeopleActs {
  const members = memberStatements(connection);
  const tokens = tokenStatements(connection);
  const updateClub = connection.prepare<unknown[], ClubRow>(
    `UPDATE club SET name = @name, public_dashboard = @publicDashboard, revision = revision + 1, updated_at = @at
     WHERE id = @clubId AND revision = @revision RETURNING ${clubColumns}`,
  );

  const memberOf = ({ clubId }: Actor, id: string): MemberRow => {
    const row = members.select.get(clubId, id);
    if (row === undefined) throw new StoreError('unavailable', `There is no member ${id}.`);
    return row;
  };
  const writePerson = ({ clubId }: Actor, id: string, person: Person | null) => {
    members.deletePerson.run(clubId, id);
    if (person !== null) members.insertPerson.run({ clubId, id, ...person });
  };
  /** Whether the member is the one steward that the club has left. */
  const isLastSteward = ({ clubId, id, role, active }: MemberRow) =>
    role === 'steward' && active === 1 && members.otherSteward.get(clubId, id) === undefined;

  return {
    editClub(actor, revision, { name, publicDashboard }) {
      const { clubId, at } = actor;
      const facts = { name, publicDashboard: publicDashboard ? 1 : 0 };
      const row = updateClub.get({ clubId, at, revision, ...facts });
      if (row === undefined) throw stale(clubId, revision);
      writeEvent(actor, 'club_edited', clubId);
      return row;
    },
    addMember(actor, id, { person, ...facts }) {
      members.insert.run({ ...actor, id, ...facts, active: facts.active ? 1 : 0 });
      writePerson(actor, id, person);
      writeEvent(actor, 'member_added', id);
      return memberOf(actor, id);
    },
    editMember(actor, id, revision, { person, ...facts }) {
      const before = memberOf(actor, id);
      if (before.revision !== revision) throw stale(id, revision);
      if (before.erasedAt !== null) return { outcome: 'erased-before' };
      const staysSteward = facts.role === 'steward' && facts.active;
      if (!staysSteward && isLastSteward(before)) return { outcome: 'last-steward' };
      members.update.run({ ...actor, id, ...facts, active: facts.active ? 1 : 0, erasedAt: null });
      writePerson(actor, id, person);
      writeEvent(actor, 'member_edited', id);
      return { outcome: 'changed', row: memberOf(actor, id) };
    },
    eraseMember(actor, id) {
      const before = memberOf(actor, id);
      if (before.erasedAt !== null) return { outcome: 'erased-before' };
      if (isLastSteward(before)) return { outcome: 'last-steward' };
      const { role } = before;
      const erased = { role, active: 0, shownAs: 'pseudonym', erasedAt: actor.at };
      members.update.run({ ...actor, id, ...erased });
      writePerson(actor, id, null);
      tokens.revokeAll.run({ ...actor, id });
      members.deleteOrigins.run(actor.clubId, id);
      writeEvent(actor, 'member_erased', id);
      return { outcome: 'changed', row: memberOf(actor, id) };
    },
    addToken(actor, token, secretSha256) {
      const scopes = token.scopes === null ? null : JSON.stringify(token.scopes);
      const { clubId, at } = actor;
      const row = tokens.insert.get({ ...token, scopes, clubId, at, secretSha256 });
      if (row === undefined) return null;
      writeEvent(actor, 'token_added', token.id);
      return row;
    },
    revokeToken(actor, id) {
      const { changes } = tokens.revoke.run({ ...actor, id });
      if (changes > 0) writeEvent(actor, 'token_revoked', id);
      return null;
    },
    noteTokenUse(clubId, id, at) {
      tokens.noteUse.run(at, clubId, id);
      return null;
    },
  };
}

function stale(id: string, revision: number): StoreError {
  return new StoreError('stale', `Revision ${revision} of ${id} is not the present one.`);
}

function memberStatements(connection: Connection) {
  return {
    insert: connection.prepare(
      `INSERT INTO member (club_id, id, revision, role, active, pseudonym, shown_as, created_at, updated_at)
       SELECT @clubId, @id, 1, @role, @active, 'Member ' || (count(*) + 1), @shownAs, @at, @at
       FROM member WHERE club_id = @clubId`,
    ),
    update: connection.prepare(
      `UPDATE member SET role = @role, active = @active, shown_as = @shownAs, erased_at = @erasedAt,
         revision = revision + 1, updated_at = @at
       WHERE club_id = @clubId AND id = @id`,
    ),
    select: connection.prepare<unknown[], MemberRow>(
      `SELECT ${memberColumns} WHERE member.club_id = ? AND member.id = ?`,
    ),
    otherSteward: connection.prepare(
      `SELECT 1 FROM member WHERE club_id = ? AND id <> ? AND role = 'steward' AND active = 1 LIMIT 1`,
    ),
    insertPerson: connection.prepare(
      `INSERT INTO person (club_id, member_id, name, call_sign, contact)
       VALUES (@clubId, @id, @name, @callSign, @contact)`,
    ),
    // The chain of the audit trail covers a salted hash, so it holds without them.
    deleteOrigins: connection.prepare(
      'DELETE FROM audit_origin WHERE seq IN (SELECT seq FROM audit WHERE club_id = ? AND member_id = ?)',
    ),
    deletePerson: connection.prepare('DELETE FROM person WHERE club_id = ? AND member_id = ?'),
  };
}

function tokenStatements(connection: Connection) {
  return {
    insert: connection.prepare<unknown[], TokenRow>(
      `INSERT INTO token (id, club_id, member_id, label, secret_sha256, scopes, created_at, expires_at)
       SELECT @id, club_id, id, @label, @secretSha256, @scopes, @at, @expiresAt
       FROM member WHERE club_id = @clubId AND id = @memberId AND active = 1
       RETURNING ${tokenColumns}`,
    ),
    revoke: connection.prepare(
      'UPDATE token SET revoked_at = @at WHERE club_id = @clubId AND id = @id AND revoked_at IS NULL',
    ),
    // A label may name a person or their device.
    revokeAll: connection.prepare(
      `UPDATE token SET label = '', revoked_at = coalesce(revoked_at, @at)
       WHERE club_id = @clubId AND member_id = @id`,
    ),
    noteUse: connection.prepare('UPDATE token SET last_used_at = ? WHERE club_id = ? AND id = ?'),
  };
}
