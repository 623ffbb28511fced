import { randomBytes } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { Writable } from 'node:stream';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { makeToken } from '../../server/auth/token.ts';
import { addAntenna, resonatorFile, upload } from '../support/club-records.ts';
import { makeTestApp, type TestApp, testUrl } from '../support/test-app.ts';

let club: TestApp;
beforeAll(async () => {
  club = await makeTestApp();
});
afterAll(() => club.close());

const challenge = 'Bearer realm="sweep-ledger"';
const sites = (authorization: string) =>
  club.call({ url: '/v1/sites', headers: { authorization } });

describe('a request behind the token', () => {
  it('without one is answered with a plain challenge (RFC 6750, section 3)', async () => {
    const answer = await club.app.inject({ url: '/v1/sites' });
    expect(answer.statusCode).toBe(401);
    expect(answer.headers['www-authenticate']).toBe(challenge);
    expect(answer.json().type).toBe(`${testUrl}/problems/unauthenticated`);
  });

  it('with another scheme is answered with a plain challenge', async () => {
    const answer = await sites('Basic YTpi');
    expect(answer.statusCode).toBe(401);
    expect(answer.headers['www-authenticate']).toBe(challenge);
  });

  it('with a wrong token is answered alike, whether it is malformed or unknown', async () => {
    const last = club.token.at(-1) === 'a' ? 'b' : 'a';
    const wrong = [makeToken(randomBytes), 'sl_short', 'x', club.token.slice(0, -1) + last];
    for (const token of wrong) {
      const answer = await sites(`Bearer ${token}`);
      expect(answer.statusCode).toBe(401);
      expect(answer.headers['www-authenticate']).toBe(`${challenge}, error="invalid_token"`);
    }
  });

  it('takes the scheme in any case (RFC 9110, section 11.1)', async () => {
    expect((await sites(`bearer ${club.token}`)).statusCode).toBe(200);
  });

  it('is refused with a token in the URL, even a valid one', async () => {
    const encoded = `%73${club.token.slice(1)}`;
    const urls = [
      '/v1/sites?access_token=x',
      `/v1/sites?token=${club.token}`,
      `/v1/sites?note=before${club.token}after`,
      `/v1/sites?note=${encoded}`,
      `/v1/sites/${club.token}`,
      `/problems/${encoded}`,
    ];
    for (const url of urls) {
      const answer = await club.call({ url });
      expect(answer.statusCode).toBe(400);
      expect(answer.json().type).toBe(`${testUrl}/problems/token-in-url`);
    }
  });

  it('is every one under /v1 but the public ones, and the counters', async () => {
    const paths: Record<string, object> = JSON.parse(
      readFileSync(new URL('../../openapi/openapi.json', import.meta.url), 'utf8'),
    ).paths;
    const guarded = Object.entries(paths).filter(([path]) =>
      /^\/(v1(?!\/public\/)|metrics)/.test(path),
    );
    expect(guarded.length).toBeGreaterThan(10);
    for (const [path, item] of guarded) {
      for (const method of Object.keys(item)) {
        const url = path.replaceAll(/\{\w+\}/g, 'x');
        const answer = await club.app.inject({ method: method.toUpperCase() as 'GET', url });
        expect([method, path, answer.statusCode]).toEqual([method, path, 401]);
      }
    }
  });

  it('is not the health, nor the pages that explain', async () => {
    for (const url of ['/livez', '/readyz', '/docs', '/openapi.json', '/problems']) {
      const answer = await club.app.inject({ url });
      expect([url, answer.statusCode]).toEqual([url, 200]);
    }
  });
});

describe('the log', () => {
  it('tells what was asked, but no token, no query and no body', async () => {
    let text = '';
    const logTo = new Writable({
      write: (chunk, _encoding, done) => {
        text += chunk;
        done();
      },
    });
    const logged = await makeTestApp({ logTo });
    await addAntenna(logged);
    await upload(logged, resonatorFile({ comment: 'secret-body' }), '?note=secret-note');
    await logged.call({ url: `/v1/sites?token=${logged.token}` });
    await logged.call({ url: `/v1/sites/${logged.token}` });
    await logged.call({ url: `/${logged.token}/nowhere` });
    await logged.call({ url: `/v1/sites/%73${logged.token.slice(1)}` });
    await logged.call({ url: '/v1/sites', headers: { cookie: 'secret-cookie' } });
    await logged.close();
    expect(text).toContain('"route":"/v1/antennas/:antenna/sweeps"');
    expect(text).toContain(`"club":"${logged.actor.clubId}"`);
    expect(text).not.toContain(logged.token.slice(1));
    expect(text).not.toMatch(/secret-(body|note|cookie)/);
  });
});
