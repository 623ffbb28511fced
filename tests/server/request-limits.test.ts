import { afterEach, describe, expect, it, vi } from 'vitest';
import { addMember } from '../support/members.ts';
import { makeTestApp, type TestApp, testUrl } from '../support/test-app.ts';

let club: TestApp;
afterEach(async () => {
  vi.useRealTimers();
  await club.close();
});

const sites = (headers: Readonly<Record<string, string>> = {}, remoteAddress = '192.0.2.1') =>
  club.call({ url: '/v1/sites', headers, remoteAddress });
const unknown = { authorization: 'Bearer sl_no' };

describe('a token with which too much is asked', () => {
  it('is told when to come back, and may then', async () => {
    vi.useFakeTimers({ toFake: ['Date'] });
    club = await makeTestApp({ requestLimits: { perAddress: 0, perToken: 3 } });
    for (let i = 0; i < 3; i++) expect((await sites()).statusCode).toBe(200);
    const refused = await sites();
    expect(refused.statusCode).toBe(429);
    expect(refused.json()).toMatchObject({ type: `${testUrl}/problems/too-many-requests` });
    const seconds = Number(refused.headers['retry-after']);
    expect(seconds).toBeGreaterThan(0);
    expect(seconds).toBeLessThanOrEqual(60);
    vi.setSystemTime(Date.now() + 1000 * seconds + 1);
    expect((await sites()).statusCode).toBe(200);
  });

  it('takes nothing from another token', async () => {
    club = await makeTestApp({ requestLimits: { perAddress: 0, perToken: 3 } });
    const { token } = await addMember(club, 'reader');
    while ((await sites()).statusCode === 200);
    expect((await sites({ authorization: `Bearer ${token}` })).statusCode).toBe(200);
  });
});

describe('an address from which too much is asked', () => {
  it('is refused before its token is looked at', async () => {
    club = await makeTestApp({ requestLimits: { perAddress: 3, perToken: 0 } });
    const looks = vi.spyOn(club.service.store, 'findToken');
    for (let i = 0; i < 3; i++) expect((await sites(unknown)).statusCode).toBe(401);
    looks.mockClear();
    const refused = await sites();
    expect(refused.statusCode).toBe(429);
    expect(Number(refused.headers['retry-after'])).toBeGreaterThan(0);
    expect(looks).not.toHaveBeenCalled();
    looks.mockRestore();
  });

  it('takes nothing from another address, and none of health', async () => {
    club = await makeTestApp({ requestLimits: { perAddress: 2, perToken: 0 } });
    while ((await sites(unknown)).statusCode === 401);
    expect((await sites({}, '192.0.2.2')).statusCode).toBe(200);
    expect((await club.call({ url: '/readyz', remoteAddress: '192.0.2.1' })).statusCode).toBe(200);
  });

  it('is the one that a trusted proxy tells, and no one else may tell', async () => {
    club = await makeTestApp({
      requestLimits: { perAddress: 1, perToken: 0 },
      trustedProxies: ['192.0.2.1'],
    });
    const from = (address: string, told: string) => sites({ 'x-forwarded-for': told }, address);
    expect((await from('192.0.2.1', '198.51.100.1')).statusCode).toBe(200);
    expect((await from('192.0.2.1', '198.51.100.2')).statusCode).toBe(200);
    expect((await from('192.0.2.1', '198.51.100.1')).statusCode).toBe(429);
    expect((await from('192.0.2.9', '198.51.100.3')).statusCode).toBe(200);
    expect((await from('192.0.2.9', '198.51.100.4')).statusCode).toBe(429);
  });
});
