import { readFileSync } from 'node:fs';
import Fastify from 'fastify';
import type { OpenAPIV3_1 } from 'openapi-types';
import { describe, expect, it } from 'vitest';
import { requireRouteRights } from '../../server/auth/route-rights.ts';
import { operationsOf } from '../../server/openapi/document.ts';
import { rights, rightsOf, roles } from '../../server/rights.ts';

const document: OpenAPIV3_1.Document = JSON.parse(
  readFileSync(new URL('../../openapi/openapi.json', import.meta.url), 'utf8'),
);

describe('a role', () => {
  it('has the rights of the one before it, and one more', () => {
    const counts = roles.map((role) => rightsOf(role).size);
    expect(counts).toEqual([1, 2, 3, 4]);
    for (const [i, role] of roles.entries()) {
      expect([...rightsOf(role)]).toEqual(rights.slice(0, i + 1));
    }
  });

  it('is narrowed by the scopes of a token, and never widened', () => {
    expect([...rightsOf('keeper', ['measure', 'administer'])]).toEqual(['measure']);
    expect([...rightsOf('steward', [])]).toEqual([]);
  });
});

describe('a route', () => {
  it('that does not say which right it needs cannot be registered', () => {
    const app = Fastify();
    requireRouteRights(app);
    const add = (right?: 'read') =>
      app.get(`/${right}`, right === undefined ? {} : { config: { right } }, () => 'x');
    expect(() => add()).toThrow(/needs `config: \{ right/);
    expect(() => add('read')).not.toThrow();
  });

  it('has its right in the document: public ones none, every other exactly one', () => {
    const operations = operationsOf(document);
    const needed = operations.map(({ security }) => security?.map(({ bearerAuth }) => bearerAuth));
    expect(needed.length).toBeGreaterThan(25);
    for (const one of needed) {
      if (one?.length !== 0)
        expect([['read'], ['measure'], ['keep'], ['administer']]).toContainEqual(one?.[0]);
    }
    const publicOnes = operations.filter(({ security }) => security?.length === 0);
    expect(publicOnes.map(({ operationId }) => operationId)).toContain('getLiveness');
    expect(publicOnes.map(({ operationId }) => operationId)).not.toContain('listSites');
  });
});
