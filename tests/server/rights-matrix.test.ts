import { randomBytes } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { makeToken } from '../../server/auth/token.ts';
import { rights, rightsOf, roles } from '../../server/rights.ts';
import { addMember, addOtherClub, askedBy } from '../support/members.ts';
import { type RouteCall, routeCalls } from '../support/route-calls.ts';
import { addRouteRecords } from '../support/route-records.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

// Every operation of the document with everybody who might ask. A new one is tried without being
// named here; a new path parameter needs a record in tests/support/route-records.ts.

const calls = routeCalls();
const guarded = calls.filter(({ right }) => right !== 'public');
/** Path parameters that name no record of a club. */
const shared = new Set(['slug', 'plan', 'club']);
const ofClub = guarded.filter(({ parameters }) => parameters.some((name) => !shared.has(name)));

let club: TestApp;
let other: TestApp;
let ours: Readonly<Record<string, string>>;
let theirs: Readonly<Record<string, string>>;
const tokensByAsker = new Map<
  string,
  { readonly token: string; readonly rights: ReadonlySet<string> }
>();
const unknownTokens = new Map<string, string | null>();

beforeAll(async () => {
  club = await makeTestApp();
  other = await addOtherClub(club);
  const measurer = await addMember(club, 'measurer');
  ours = await addRouteRecords(club, askedBy(club, measurer.token));
  theirs = await addRouteRecords(other, other);
  for (const [i, role] of roles.entries()) {
    const { id, token } = role === 'measurer' ? measurer : await addMember(club, role);
    tokensByAsker.set(role, { token, rights: rightsOf(role) });
    const payload = { member: id, label: 'narrow', scopes: [rights[i]] };
    const made = await club.call({ method: 'POST', url: '/v1/tokens', payload });
    const narrow = { token: made.json().token, rights: new Set([rights[i]]) };
    tokensByAsker.set(`${role}, for ${rights[i]} alone`, narrow);
  }
  const expired = await addMember(club, 'steward', { expires_at: '2026-06-01T13:00:00Z' });
  const revoked = await addMember(club, 'steward');
  const left = await addMember(club, 'steward');
  await club.call({ method: 'DELETE', url: `/v1/tokens/${revoked.tokenId}` });
  await club.call({
    method: 'PATCH',
    url: `/v1/members/${left.id}`,
    headers: { 'if-match': '*' },
    payload: { active: false },
  });
  club.clock.ms += 2 * 3600 * 1000;
  unknownTokens.set('nobody', null);
  unknownTokens.set('an unknown token', makeToken(randomBytes));
  unknownTokens.set('an expired token', expired.token);
  unknownTokens.set('a revoked token', revoked.token);
  unknownTokens.set('one who has left', left.token);
}, 60_000);
afterAll(() => club.close());

async function statusOf(asker: TestApp, call: RouteCall, ids: Readonly<Record<string, string>>) {
  return (await send(asker, call, ids)).statusCode;
}

function send(
  asker: TestApp,
  { method, template, body }: RouteCall,
  ids: Readonly<Record<string, string>>,
) {
  const url = template.replaceAll(/\{(\w+)\}/g, (_, name: string) => idFor(name, ids));
  return asker.call({ method, url, ...body });
}

function idFor(name: string, ids: Readonly<Record<string, string>>): string {
  if (shared.has(name)) return 'x';
  const id = ids[name];
  if (id === undefined) throw new Error(`route-records.ts makes no record for {${name}}.`);
  return id;
}

it('the document has the routes that this goes through', () => {
  expect(guarded.length).toBeGreaterThanOrEqual(39);
  expect(ofClub.length).toBeGreaterThanOrEqual(24);
});

describe("another club's ids", () => {
  it.for(ofClub.map((call) => [call.operationId, call] as const))(
    'lead nowhere: %s answers 404 to a steward',
    async ([, call]) => {
      expect(await statusOf(other, call, ours)).toBe(404);
    },
  );

  it('lead somewhere in their own club', async () => {
    const reads = ofClub.filter(({ method, isEndless }) => method === 'GET' && !isEndless);
    expect(reads.length).toBeGreaterThanOrEqual(14);
    for (const call of reads) {
      expect([call.operationId, await statusOf(club, call, ours)]).toEqual([call.operationId, 200]);
    }
  });

  it('stand in no list of a club that they are not of', async () => {
    const lists = guarded.filter(
      ({ method, parameters, isEndless }) =>
        method === 'GET' && parameters.every((name) => shared.has(name)) && !isEndless,
    );
    expect(lists.length).toBeGreaterThanOrEqual(7);
    for (const call of lists) {
      const { body } = await send(other, call, theirs);
      for (const id of Object.values(ours)) expect([call.operationId, body]).not.toContain(id);
      expect([call.operationId, body.includes(club.actor.clubId)]).toEqual([
        call.operationId,
        false,
      ]);
    }
  });

  it('are unknown as query parameters too', async () => {
    const named = guarded.flatMap((call) =>
      call.queries.flatMap((name) =>
        name in ours && !call.isEndless ? [[name, call] as const] : [],
      ),
    );
    expect(named.length).toBeGreaterThanOrEqual(3);
    for (const [name, call] of named) {
      const joint = call.template.includes('?') ? '&' : '?';
      const foreign = { ...call, template: `${call.template}${joint}${name}=${ours[name]}` };
      const answer = await send(other, foreign, theirs);
      const isEmpty = answer.statusCode === 200 && answer.json().items?.length === 0;
      expect([call.operationId, name, isEmpty || answer.statusCode]).toEqual([
        call.operationId,
        name,
        isEmpty || expect.toSatisfy((status: number) => status === 404 || status === 422),
      ]);
    }
  });
});

describe('a route that needs a right', () => {
  it.for(guarded.map((call) => [call.operationId, call] as const))(
    '%s answers 401 to all who have no valid token',
    async ([, call]) => {
      expect(unknownTokens.size).toBe(5);
      for (const [asker, token] of unknownTokens) {
        const answer = await send(askedBy(club, token), call, ours);
        expect([asker, answer.statusCode]).toEqual([asker, 401]);
        expect(answer.headers['www-authenticate']).toContain('Bearer realm="sweep-ledger"');
      }
    },
  );

  it.for(guarded.map((call) => [call.operationId, call] as const))(
    '%s answers 403 to all whose token lacks it',
    async ([, call]) => {
      const lacking = [...tokensByAsker].filter(([, { rights }]) => !rights.has(call.right));
      expect(lacking.length).toBeGreaterThanOrEqual(3);
      for (const [asker, { token }] of lacking) {
        const answer = await send(askedBy(club, token), call, ours);
        expect([asker, answer.statusCode]).toEqual([asker, 403]);
        expect(answer.headers['www-authenticate']).toContain(`scope="${call.right}"`);
      }
    },
  );

  // Last, for these change things.
  it.for(guarded.map((call) => [call.operationId, call] as const))(
    '%s lets all through whose token has it',
    async ([, call]) => {
      const having = [...tokensByAsker].filter(([, { rights }]) => rights.has(call.right));
      expect(having.length).toBeGreaterThanOrEqual(2);
      for (const [asker, { token }] of call.isEndless ? [] : having) {
        const status = await statusOf(askedBy(club, token), call, ours);
        expect([asker, status < 500 && status !== 401 && status !== 403, status]).toEqual([
          asker,
          true,
          status,
        ]);
      }
    },
  );
});

describe('a public route', () => {
  it('is open to all, whatever token they have', async () => {
    const open = calls.filter(({ right, isEndless }) => right === 'public' && !isEndless);
    expect(open.length).toBeGreaterThanOrEqual(4);
    for (const call of open) {
      for (const token of [null, ...unknownTokens.values()]) {
        const status = await statusOf(askedBy(club, token), call, ours);
        expect([call.operationId, status]).not.toContain(401);
        expect([call.operationId, status]).not.toContain(403);
      }
    }
  });
});
