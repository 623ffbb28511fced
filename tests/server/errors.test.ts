import { readFileSync } from 'node:fs';
import { connect } from 'node:net';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { type ProblemSlug, problemBody, problemKinds } from '../../server/problems.ts';
import { StoreError, type StoreErrorKind } from '../../server/store/port.ts';
import { makeTestApp, type TestApp, testUrl } from '../support/test-app.ts';

const slugs = Object.keys(problemKinds) as ProblemSlug[];

let club: TestApp;
beforeAll(async () => {
  club = await makeTestApp();
  await club.app.listen({ host: '127.0.0.1', port: 0 });
});
afterAll(() => club.close());

describe('an error', () => {
  it('is a problem with a type that has a page, and the id of the request', async () => {
    const answer = await club.call({ url: '/v1/nowhere' });
    expect(answer.statusCode).toBe(404);
    expect(answer.headers['content-type']).toBe('application/problem+json');
    const { type, status, title, instance } = answer.json();
    expect({ status, title }).toEqual({ status: 404, title: problemKinds['not-found'].title });
    expect(instance).toBe(`urn:uuid:${answer.headers['x-request-id']}`);
    const page = await club.call({ url: type.slice(testUrl.length) });
    expect(page.statusCode).toBe(200);
    expect(page.body).toContain(title);
  });

  it('of the method names the methods that the path takes', async () => {
    const answer = await club.call({ method: 'DELETE', url: '/v1/sites/x' });
    expect(answer.statusCode).toBe(405);
    expect(answer.headers.allow).toBe('GET, HEAD, PATCH');
    expect((await club.call({ method: 'PUT', url: '/livez' })).headers.allow).toBe('GET, HEAD');
  });

  it('of the path is a 404 whatever the body', async () => {
    const answer = await club.call({
      method: 'POST',
      url: '/nowhere',
      payload: '<x/>',
      headers: { 'content-type': 'text/xml' },
    });
    expect(answer.statusCode).toBe(404);
  });

  it('of the URL is a problem too', async () => {
    expect((await club.call({ url: '/v1/sites/%zz' })).statusCode).toBe(400);
    expect((await club.call({ url: `/v1/sites/${'x'.repeat(200)}` })).statusCode).toBe(414);
  });

  it('lists at most 100 places', () => {
    const errors = Array.from({ length: 101 }, (_, i) => ({ detail: `${i}` }));
    const body = problemBody('invalid-request', { errors }, testUrl, 'id');
    expect(body['errors']).toHaveLength(100);
    expect(body['errors_truncated']).toBe(true);
  });
});

describe('a request that is not HTTP', () => {
  const exchange = (text: string) =>
    new Promise<string>((resolve, reject) => {
      const address = club.app.server.address();
      if (address === null || typeof address === 'string') throw new Error('not listening');
      const socket = connect(address.port, address.address, () => socket.end(text));
      let answer = '';
      socket.on('data', (chunk) => {
        answer += chunk;
      });
      socket.on('end', () => resolve(answer));
      socket.on('error', reject);
    });

  it.each([
    ['NONSENSE\r\n\r\n', 400, 'malformed-request'],
    [`GET / HTTP/1.1\r\nHost: a\r\nX: ${'x'.repeat(20_000)}\r\n\r\n`, 431, 'headers-too-large'],
  ])('is answered with a problem: %#', async (text, status, slug) => {
    const answer = await exchange(text);
    const [head, body] = answer.split('\r\n\r\n');
    expect(head).toMatch(new RegExp(`^HTTP/1.1 ${status} `));
    expect(head).toContain('Content-Type: application/problem+json');
    expect(JSON.parse(body)).toMatchObject({ status, type: `${testUrl}/problems/${slug}` });
  });
});

describe('a store that fails', () => {
  let broken: TestApp;
  afterEach(() => broken.close());
  const failing = async (error: Error) => {
    broken = await makeTestApp({
      around: (store) =>
        new Proxy(store, {
          get: (target, name) => {
            if (name === 'addEditable' || name === 'ready')
              return async () => Promise.reject(error);
            const member: unknown = Reflect.get(target, name);
            return typeof member === 'function' ? member.bind(target) : member;
          },
        }),
    });
    return broken.call({
      method: 'POST',
      url: '/v1/sites',
      payload: { key: 'a', name: 'A' },
    });
  };

  it.each<[StoreErrorKind, number, ProblemSlug]>([
    ['conflict', 409, 'key-in-use'],
    ['full', 507, 'storage-full'],
    ['unavailable', 503, 'unavailable'],
  ])('with %s is answered with %i', async (kind, status, slug) => {
    const answer = await failing(new StoreError(kind, 'disk /secret/path', 'key'));
    expect(answer.statusCode).toBe(status);
    expect(answer.json().type).toBe(`${testUrl}/problems/${slug}`);
    expect(answer.body).not.toContain('secret');
    if (status === 503) expect(answer.headers['retry-after']).toBe('5');
  });

  it('in a way nobody foresaw is answered with 500 and tells nothing of the inside', async () => {
    const answer = await failing(new Error('SELECT secret FROM /secret/path'));
    expect(answer.statusCode).toBe(500);
    expect(answer.body).not.toMatch(/secret|SELECT|node_modules|\.ts/);
  });

  it('makes the service not ready, yet alive', async () => {
    await failing(new StoreError('unavailable', ''));
    expect((await broken.call({ url: '/readyz' })).statusCode).toBe(503);
    expect((await broken.call({ url: '/livez' })).statusCode).toBe(200);
  });
});

describe('the catalogue of problems', () => {
  const document = readFileSync(new URL('../../openapi/openapi.json', import.meta.url), 'utf8');

  it('has a page for every kind, and no page for any other', async () => {
    expect(slugs.length).toBeGreaterThan(20);
    const list = await club.call({ url: '/problems' });
    for (const slug of slugs) {
      const page = await club.call({ url: `/problems/${slug}` });
      expect([slug, page.statusCode]).toEqual([slug, 200]);
      expect(page.headers['content-type']).toBe('text/html; charset=utf-8');
      expect(list.body).toContain(`href="/problems/${slug}"`);
    }
    expect((await club.call({ url: '/problems/toString' })).statusCode).toBe(404);
  });

  it('is the kinds that the document names, both ways', () => {
    // These answer before a request has an operation.
    const anywhere = ['method-not-allowed', 'request-timeout'];
    const named = new Set([...document.matchAll(/\(`([a-z-]+)`\)\./g)].map(([, slug]) => slug));
    expect([...named, ...anywhere].sort()).toEqual([...slugs].sort());
  });
});
