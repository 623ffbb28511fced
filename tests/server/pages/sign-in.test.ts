import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { addMember } from '../../support/members.ts';
import { makeTestApp, type TestApp, testUrl } from '../../support/test-app.ts';

describe('signing in', () => {
  let test: TestApp;
  beforeAll(async () => {
    test = await makeTestApp();
  });
  afterAll(() => test.close());

  const send = (token: string, headers: Record<string, string> = {}, more = '') =>
    test.app.inject({
      method: 'POST',
      url: '/sign-in',
      headers: {
        'content-type': 'application/x-www-form-urlencoded',
        'sec-fetch-site': 'same-origin',
        ...headers,
      },
      payload: `token=${token}${more}`,
    });

  it('answers with the cookie and the page that was asked for', async () => {
    const answer = await send(test.token, {}, '&next=%2Fupload&stay=yes');
    expect(answer.statusCode).toBe(303);
    expect(answer.headers.location).toBe('/upload');
    const set = String(answer.headers['set-cookie']);
    expect(set).toContain('HttpOnly');
    expect(set).toContain('SameSite=Strict');
    expect(set).toContain('Max-Age=2592000');
    // The test's own address is plain HTTP, where a browser would drop a Secure cookie.
    expect(testUrl).toMatch(/^http:/);
    expect(set).not.toContain('Secure');
  });

  it('from another site sets no cookie', async () => {
    const answer = await send(test.token, { 'sec-fetch-site': 'cross-site' });
    expect(answer.statusCode).toBe(403);
    expect(answer.headers['set-cookie']).toBeUndefined();
  });

  it('needs a token that may read', async () => {
    const { token } = await addMember(test, 'measurer', { scopes: ['measure'] });
    const answer = await send(token);
    expect(answer.statusCode).toBe(422);
    expect(answer.body).toContain('may not read');
  });

  it('sends nobody to another site', async () => {
    const answer = await send(test.token, {}, '&next=%2F%2Felsewhere.example');
    expect(answer.headers.location).toBe('/');
  });

  it('does not open the interface itself, which takes bearer tokens alone', async () => {
    const cookie = String((await send(test.token)).headers['set-cookie']).split(';', 1)[0];
    const page = await test.app.inject({ url: '/problems', headers: { cookie } });
    expect(page.statusCode).toBe(200);
    const interfaceItself = await test.call({
      url: '/v1/sites',
      headers: { cookie, authorization: '' },
    });
    expect(interfaceItself.statusCode).toBe(401);
  });
});

describe('a page', () => {
  let test: TestApp;
  beforeAll(async () => {
    test = await makeTestApp();
  });
  afterAll(() => test.close());

  it('allows no script or style but files of its own', async () => {
    const answer = await test.app.inject('/sign-in');
    const policy = String(answer.headers['content-security-policy']);
    expect(policy).toContain("default-src 'none'");
    expect(policy).not.toContain('unsafe');
    expect(answer.body).not.toMatch(/<style|style=|<script(?! src=)|\son[a-z]+=/);
  });

  it('of no record is refused in words, as a page', async () => {
    const headers = { cookie: `sweep-ledger-token=${test.token}` };
    const url = '/sweeps/019ad9a1-7a00-7000-8000-000000000001';
    const answer = await test.app.inject({ url, headers });
    expect(answer.statusCode).toBe(404);
    expect(answer.headers['content-type']).toContain('text/html');
    expect(answer.body).toContain('There is no such thing here');
  });
});
