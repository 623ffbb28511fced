import type { FastifyInstance } from 'fastify';
import type { RouteRight } from '../rights.ts';

declare module 'fastify' {
  interface FastifyContextConfig {
    /** The right that the route needs: held against the token and written into the document. */
    right?: RouteRight;
  }
}

/** Refuses to register a route that does not say which right it needs; /docs brings its own. */
export function requireRouteRights(app: FastifyInstance): void {
  app.addHook('onRoute', ({ method, url, config }) => {
    if (config?.right !== undefined || /^\/docs(\/|$)/.test(url)) return;
    throw new Error(`${method} ${url} needs \`config: { right: … }\`; see server/rights.ts.`);
  });
}
