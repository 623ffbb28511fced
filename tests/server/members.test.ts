import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { addMember, bearer } from '../support/members.ts';
import { makeTestApp, type TestApp, testUrl } from '../support/test-app.ts';

let club: TestApp;
beforeAll(async () => {
  club = await makeTestApp();
});
afterAll(() => club.close());

const read = (url: string, token = club.token) => club.call({ url, headers: bearer(token) });
const patch = (url: string, tag: string, payload: object) =>
  club.call({ method: 'PATCH', url, headers: { 'if-match': tag }, payload });
const typeOf = (answer: { json(): { type: string } }) =>
  answer.json().type.replace(`${testUrl}/problems/`, '');

describe('a member', () => {
  it('is added by a steward, and answers with a place and a tag', async () => {
    const payload = { role: 'keeper', person: { name: 'Invented Keeper', call_sign: 'XX0KP' } };
    const answer = await club.call({ method: 'POST', url: '/v1/members', payload });
    expect(answer.statusCode).toBe(201);
    const { id } = answer.json();
    expect(answer.headers.location).toBe(`${testUrl}/v1/members/${id}`);
    expect(answer.headers.etag).toBe(`"${id}.1"`);
    expect(answer.json()).toMatchObject({
      role: 'keeper',
      active: true,
      shown_as: 'name',
      shown_name: 'Invented Keeper',
      person: { name: 'Invented Keeper', call_sign: 'XX0KP', contact: null },
    });
  });

  it('shows others what they wish to be called, and nothing else of the person', async () => {
    const reader = await addMember(club, 'reader');
    const keeper = await addMember(club, 'keeper');
    const url = `/v1/members/${keeper.id}`;
    expect((await read(url, reader.token)).json()).toMatchObject({
      shown_name: 'Invented keeper',
      person: null,
    });
    expect((await read(url, keeper.token)).json().person).toMatchObject({ contact: 'by the door' });
    const { headers } = await read(url);
    await patch(url, String(headers.etag), { shown_as: 'pseudonym' });
    const shown = (await read(url, reader.token)).json();
    expect(shown.shown_name).toBe(shown.pseudonym);
    const list = (await read('/v1/members?limit=500', reader.token)).body;
    expect(list).toContain(shown.pseudonym);
    expect(list).not.toContain('Invented keeper');
  });

  it('has another tag for those who do not see the person', async () => {
    const reader = await addMember(club, 'reader');
    const keeper = await addMember(club, 'keeper');
    const url = `/v1/members/${keeper.id}`;
    const [full, shown] = [await read(url), await read(url, reader.token)];
    expect(full.headers.etag).not.toBe(shown.headers.etag);
    const again = await club.call({ url, headers: { 'if-none-match': String(full.headers.etag) } });
    expect(again.statusCode).toBe(304);
  });

  it('is edited only from the present revision', async () => {
    const { id } = await addMember(club, 'reader');
    const url = `/v1/members/${id}`;
    const without = await club.call({ method: 'PATCH', url, payload: { role: 'keeper' } });
    expect([without.statusCode, typeOf(without)]).toEqual([428, 'precondition-required']);
    const edited = await patch(url, `"${id}.1"`, { role: 'keeper' });
    expect([edited.statusCode, edited.json().role]).toEqual([200, 'keeper']);
    const late = await patch(url, `"${id}.1"`, { role: 'steward' });
    expect([late.statusCode, typeOf(late)]).toEqual([412, 'stale']);
  });

  it('has the rights of a new role with the next request', async () => {
    const { id, token } = await addMember(club, 'reader');
    const addSite = (key: string) =>
      club.call({
        method: 'POST',
        url: '/v1/sites',
        headers: bearer(token),
        payload: { key, name: 'Field' },
      });
    const refused = await addSite('early');
    expect(refused.statusCode).toBe(403);
    expect(refused.headers['www-authenticate']).toBe(
      'Bearer realm="sweep-ledger", error="insufficient_scope", scope="keep"',
    );
    await patch(`/v1/members/${id}`, '*', { role: 'keeper' });
    expect((await addSite('late')).statusCode).toBe(201);
  });

  it('who measures edits the analyzers they added, a keeper edits all', async () => {
    const [one, two] = [await addMember(club, 'measurer'), await addMember(club, 'measurer')];
    const keeper = await addMember(club, 'keeper');
    const payload = { key: 'one-s-own', name: 'Own' };
    const headers = bearer(one.token);
    const url = '/v1/analyzers';
    expect((await club.call({ method: 'POST', url, headers, payload })).statusCode).toBe(201);
    const edit = async ({ token }: { token: string }) =>
      club.call({
        method: 'PATCH',
        url: `${url}/one-s-own`,
        headers: { ...bearer(token), 'if-match': '*' },
        payload: { note: 'moved' },
      });
    expect((await edit(one)).statusCode).toBe(200);
    const refused = await edit(two);
    expect([refused.statusCode, typeOf(refused)]).toEqual([403, 'insufficient-right']);
    expect((await edit(keeper)).statusCode).toBe(200);
  });

  it('who has left has no valid token', async () => {
    const { id, token } = await addMember(club, 'reader');
    expect((await read('/v1/sites', token)).statusCode).toBe(200);
    await patch(`/v1/members/${id}`, '*', { active: false });
    expect((await read('/v1/sites', token)).statusCode).toBe(401);
    const payload = { member: id, label: 'too late' };
    const late = await club.call({ method: 'POST', url: '/v1/tokens', payload });
    expect([late.statusCode, typeOf(late)]).toEqual([422, 'unknown-reference']);
  });

  it('who is the last steward stays one', async () => {
    const url = `/v1/members/${club.actor.memberId}`;
    for (const edit of [{ role: 'keeper' }, { active: false }]) {
      const answer = await patch(url, '*', edit);
      expect([answer.statusCode, typeOf(answer)]).toEqual([409, 'last-steward']);
    }
    const erased = await club.call({ method: 'POST', url: `${url}/erase` });
    expect([erased.statusCode, typeOf(erased)]).toEqual([409, 'last-steward']);
  });
});

describe('erasing a member', () => {
  it('leaves the id that records name, and a pseudonym', async () => {
    const { id, token } = await addMember(club, 'measurer');
    const added = await club.call({
      method: 'POST',
      url: '/v1/analyzers',
      headers: bearer(token),
      payload: { key: 'own', name: 'Own' },
    });
    expect(added.statusCode).toBe(201);
    const url = `/v1/members/${id}`;
    const erased = await club.call({ method: 'POST', url: `${url}/erase` });
    expect(erased.statusCode).toBe(200);
    const { pseudonym, shown_name, person, active, erased_at } = erased.json();
    expect({ shown_name, person, active }).toEqual({
      shown_name: pseudonym,
      person: null,
      active: false,
    });
    expect(erased_at).not.toBeNull();
    expect((await read('/v1/sites', token)).statusCode).toBe(401);
    expect((await read('/v1/analyzers/own')).statusCode).toBe(200);
    expect((await read(`/v1/tokens?member=${id}`)).json().items).toMatchObject([{ label: '' }]);
  });

  it('is for good', async () => {
    const { id } = await addMember(club, 'reader');
    const url = `/v1/members/${id}`;
    await club.call({ method: 'POST', url: `${url}/erase` });
    const again = await club.call({ method: 'POST', url: `${url}/erase` });
    expect([again.statusCode, typeOf(again)]).toEqual([409, 'member-erased']);
    const edit = await patch(url, '*', { person: { name: 'Back' } });
    expect([edit.statusCode, typeOf(edit)]).toEqual([409, 'member-erased']);
  });
});

describe('the club', () => {
  it('has its public dashboard closed until a steward opens it', async () => {
    const before = await read('/v1/club');
    expect(before.json()).toMatchObject({ name: 'Test club', public_dashboard: false });
    const tag = String(before.headers.etag);
    const opened = await patch('/v1/club', tag, { public_dashboard: true });
    expect(opened.json()).toMatchObject({ name: 'Test club', public_dashboard: true, revision: 2 });
    const late = await patch('/v1/club', tag, { name: 'Other' });
    expect(late.statusCode).toBe(412);
    const unchanged = { 'if-none-match': String(opened.headers.etag) };
    expect((await club.call({ url: '/v1/club', headers: unchanged })).statusCode).toBe(304);
  });
});
