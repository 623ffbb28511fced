import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { tokenPattern } from '../../server/auth/token.ts';
import { StoreError } from '../../server/store/port.ts';
import { addMember, bearer } from '../support/members.ts';
import { makeTestApp, type TestApp, testUrl } from '../support/test-app.ts';

let club: TestApp;
beforeAll(async () => {
  club = await makeTestApp();
});
afterAll(() => club.close());

const day = 24 * 3600 * 1000;
const inDays = (days: number) => new Date(club.clock.ms + days * day).toISOString();
const ask = (payload: object, token = club.token) =>
  club.call({ method: 'POST', url: '/v1/tokens', headers: bearer(token), payload });
const statusOf = async (token: string) =>
  (await club.call({ url: '/v1/sites', headers: bearer(token) })).statusCode;
const revoke = (id: string, token = club.token) =>
  club.call({ method: 'DELETE', url: `/v1/tokens/${id}`, headers: bearer(token) });
const typeOf = (answer: { json(): { type: string } }) =>
  answer.json().type.replace(`${testUrl}/problems/`, '');

describe('a new token', () => {
  it('is shown once, to nobody who caches, and ends in a year', async () => {
    const answer = await ask({ label: 'laptop' });
    expect(answer.statusCode).toBe(201);
    expect(answer.headers['cache-control']).toBe('no-store');
    const { id, token, expires_at, scopes } = answer.json();
    expect(token).toMatch(tokenPattern);
    expect({ expires_at, scopes }).toEqual({ expires_at: inDays(366), scopes: null });
    expect(await statusOf(token)).toBe(200);
    const list = await club.call({ url: '/v1/tokens?limit=500' });
    expect(list.json().items.map((one: { id: string }) => one.id)).toContain(id);
    expect(list.body).not.toContain(token);
  });

  it('may do less than the role', async () => {
    const { token } = await addMember(club, 'keeper', { scopes: ['measure'] });
    expect(await statusOf(token)).toBe(403);
    const add = (url: string) =>
      club.call({
        method: 'POST',
        url,
        headers: bearer(token),
        payload: { key: 'narrow', name: 'N' },
      });
    expect((await add('/v1/analyzers')).statusCode).toBe(201);
    expect((await add('/v1/sites')).statusCode).toBe(403);
  });

  it('may not do more than the role', async () => {
    const { id } = await addMember(club, 'reader');
    const answer = await ask({ member: id, label: 'more', scopes: ['read', 'keep'] });
    expect([answer.statusCode, typeOf(answer)]).toEqual([422, 'implausible-fact']);
    expect(answer.json().errors[0].pointer).toBe('#/scopes/1');
  });

  it('is not made for others, but by a steward', async () => {
    const [reader, keeper] = [await addMember(club, 'reader'), await addMember(club, 'keeper')];
    const answer = await ask({ member: reader.id, label: 'theirs' }, keeper.token);
    expect([answer.statusCode, typeOf(answer)]).toEqual([403, 'insufficient-right']);
    const own = await ask({ label: 'mine' }, keeper.token);
    expect([own.statusCode, own.json().member]).toEqual([201, keeper.id]);
  });
});

describe('a token without the right to administer', () => {
  it('makes none that may do more than itself', async () => {
    const narrow = await addMember(club, 'keeper', { scopes: ['read', 'measure'] });
    const same = await ask({ label: 'same' }, narrow.token);
    expect(same.json().scopes).toEqual(['read', 'measure']);
    const more = await ask({ label: 'more', scopes: ['read', 'keep'] }, narrow.token);
    expect([more.statusCode, typeOf(more)]).toEqual([422, 'implausible-fact']);
  });

  it('makes none that lasts longer than itself', async () => {
    const short = await addMember(club, 'reader', { expires_at: inDays(2) });
    expect((await ask({ label: 'as long' }, short.token)).json().expires_at).toBe(inDays(2));
    for (const expires_at of [null, inDays(3)]) {
      const longer = await ask({ label: 'longer', expires_at }, short.token);
      expect(longer.json().errors).toMatchObject([{ pointer: '#/expires_at' }]);
    }
    expect((await ask({ label: 'shorter', expires_at: inDays(1) }, short.token)).statusCode).toBe(
      201,
    );
  });
});

describe('a token that was given a time', () => {
  it('in the past is refused', async () => {
    const answer = await ask({ label: 'late', expires_at: inDays(-1) });
    expect([answer.statusCode, typeOf(answer)]).toEqual([422, 'implausible-fact']);
  });

  it('is valid until then and not from then on', async () => {
    const { token } = await addMember(club, 'reader', { expires_at: inDays(1) });
    const before = club.clock.ms;
    club.clock.ms = before + day - 1;
    expect(await statusOf(token)).toBe(200);
    club.clock.ms = before + day;
    const answer = await club.call({ url: '/v1/sites', headers: bearer(token) });
    expect(answer.statusCode).toBe(401);
    expect(answer.headers['www-authenticate']).toContain('error="invalid_token"');
    club.clock.ms = before;
  });
});

describe('revoking a token', () => {
  it('ends it at once, and again is no fault', async () => {
    const { tokenId, token } = await addMember(club, 'reader');
    expect(await statusOf(token)).toBe(200);
    expect((await revoke(tokenId)).statusCode).toBe(204);
    expect(await statusOf(token)).toBe(401);
    expect((await revoke(tokenId)).statusCode).toBe(204);
  });

  it("is for a member's own ones; those of others are as if they were not there", async () => {
    const [one, two] = [await addMember(club, 'reader'), await addMember(club, 'keeper')];
    expect((await revoke(one.tokenId, two.token)).statusCode).toBe(404);
    expect(await statusOf(one.token)).toBe(200);
    expect((await revoke(two.tokenId, two.token)).statusCode).toBe(204);
  });
});

describe('the last use of a token', () => {
  it('is noted at most every five minutes', async () => {
    const { id, token } = await addMember(club, 'reader');
    const minute = 60_000;
    const begun = club.clock.ms;
    const used = async (minutes: number) => {
      club.clock.ms = begun + minutes * minute;
      expect(await statusOf(token)).toBe(200);
      // A write of its own comes after the note: writes keep their order.
      await ask({ label: 'after' });
      const list = await club.call({ url: `/v1/tokens?member=${id}` });
      return (Date.parse(list.json().items[0].last_used_at) - begun) / minute;
    };
    expect(await used(0)).toBe(0);
    expect(await used(4.9)).toBe(0);
    expect(await used(5)).toBe(5);
    expect(await used(9.9)).toBe(5);
    expect(await used(12)).toBe(12);
    club.clock.ms = begun;
  });

  it('that cannot be noted is no fault of the request', async () => {
    const failing = await makeTestApp({
      around: (store) =>
        new Proxy(store, {
          get: (target, name) =>
            name === 'people'
              ? { noteTokenUse: () => Promise.reject(new StoreError('full', 'no room')) }
              : Reflect.get(target, name).bind?.(target),
        }),
    });
    expect((await failing.call({ url: '/v1/sites' })).statusCode).toBe(200);
    await failing.close();
  });
});

describe('the list of tokens', () => {
  it("has a member's own; a steward sees all, or those of one member", async () => {
    const one = await addMember(club, 'reader');
    const members = async (query: string, token: string) => {
      const answer = await club.call({ url: `/v1/tokens${query}`, headers: bearer(token) });
      return [...new Set(answer.json().items.map(({ member }: { member: string }) => member))];
    };
    expect(await members('', one.token)).toEqual([one.id]);
    expect(await members(`?member=${one.id}`, club.token)).toEqual([one.id]);
    expect((await members('?limit=500', club.token)).length).toBeGreaterThan(3);
    const others = `/v1/tokens?member=${club.actor.memberId}`;
    const refused = await club.call({ url: others, headers: bearer(one.token) });
    expect([refused.statusCode, typeOf(refused)]).toEqual([403, 'insufficient-right']);
  });
});
