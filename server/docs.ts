import fastifySwagger from '@fastify/swagger';
import fastifySwaggerUi from '@fastify/swagger-ui';
import type { OpenAPIV3, OpenAPIV3_1 } from 'openapi-types';
import type { App } from './http/app-type.ts';

/** Only what the page itself brings may load; swagger-ui sets inline styles and data images. */
const docsPolicy = [
  "default-src 'none'",
  "script-src 'self'",
  "style-src 'self' 'unsafe-inline'",
  "img-src 'self' data:",
  "connect-src 'self'",
  "base-uri 'none'",
  "form-action 'none'",
  "frame-ancestors 'none'",
].join('; ');

/** Serves the document at /openapi.json and as a page at /docs, its assets from here. */
export async function serveDocs(app: App, document: OpenAPIV3_1.Document): Promise<void> {
  // The plugin's types know 3.0 only; it passes any document on as it is.
  const specification = { document: document as OpenAPIV3.Document };
  await app.register(fastifySwagger, { mode: 'static', specification });
  await app.register(fastifySwaggerUi, {
    routePrefix: '/docs',
    staticCSP: docsPolicy,
    theme: { title: 'Sweep Ledger: the interface' },
    // Without the bar on top, which would show another project's mark and load any document.
    uiConfig: {
      layout: 'BaseLayout',
      validatorUrl: null,
      deepLinking: true,
      persistAuthorization: false,
    },
  });
  const text = JSON.stringify(document);
  app.get(
    '/openapi.json',
    { config: { right: 'public' }, schema: { hide: true } },
    async (_request, reply) =>
      reply.header('cache-control', 'no-cache').type('application/json').send(text),
  );
}
