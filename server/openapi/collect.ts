import fastifySwagger from '@fastify/swagger';
import { jsonSchemaTransform, jsonSchemaTransformObject } from 'fastify-type-provider-zod';
import type { App } from '../http/app-type.ts';
import type { RouteRight } from '../rights.ts';

const description = `A radio club's record of its antenna tests.

Fields may be added to answers at any time: pass over what you do not know. Unknown fields and
parameters in requests are refused. Times are RFC 3339 in UTC, units stand in the names.`;

/** Collects the schemas of the routes registered from now on, for \`app.swagger()\`. */
export async function collectRoutes(app: App): Promise<void> {
  await app.register(fastifySwagger, {
    openapi: {
      openapi: '3.1.0',
      info: {
        title: 'Sweep Ledger',
        version: '1',
        description,
        license: { name: 'MIT', identifier: 'MIT' },
      },
      servers: [{ url: '/', description: 'Where this document was read.' }],
      tags: [
        { name: 'sites', description: 'Places where antennas stand.' },
        { name: 'antennas', description: 'What is measured.' },
        { name: 'analyzers', description: 'What it is measured with.' },
        { name: 'sweeps', description: 'Measurements: upload, record, file and points.' },
        { name: 'reports', description: 'What follows from a sweep.' },
        { name: 'charts', description: 'Sweeps and what follows from them, drawn.' },
        { name: 'history', description: 'Antennas over time.' },
        { name: 'work', description: 'What was done to antennas.' },
        { name: 'cables', description: 'Cables with their sources, and the club’s own.' },
        { name: 'line checks', description: 'Sweeps into feed lines: length, loss and faults.' },
        { name: 'dashboard', description: 'How everything stands, in one answer.' },
        { name: 'events', description: 'What happens, as it happens.' },
        { name: 'plans', description: 'Band plans with their sources.' },
        { name: 'people', description: 'The club, its members and their tokens.' },
        { name: 'operations', description: 'Health, counters and the pages behind problems.' },
      ],
      components: {
        securitySchemes: {
          bearerAuth: {
            type: 'http',
            scheme: 'bearer',
            description:
              'A token of a member. Each operation names the right that it needs: `read`, `measure`, `keep` or `administer`.',
          },
        },
      },
      security: [{ bearerAuth: [] }],
    },
    transform: (route) => {
      const made = jsonSchemaTransform(route);
      return {
        ...made,
        schema: { ...made.schema, security: securityOf(route.route.config?.right) },
      };
    },
    transformObject: jsonSchemaTransformObject,
  });
}

/** The right that a route declares, as the document tells it: in the place of an OAuth scope. */
function securityOf(right: RouteRight = 'public') {
  return right === 'public' ? [] : [{ bearerAuth: [right] }];
}
