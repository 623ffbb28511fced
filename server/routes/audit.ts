import { z } from 'zod';
import { principalOf } from '../auth/bearer.ts';
import type { App } from '../http/app-type.ts';
import { pageRequest, sendPage } from '../http/pages.ts';
import type { Service } from '../service.ts';
import { auditEntrySchema, auditEntryToWire } from '../wire/audit.ts';
import { pageQuery, pageSchema } from '../wire/common.ts';
import { answers, jsonAnswer } from '../wire/problem.ts';
import { listProblems } from './editables.ts';

/** Who did what in the club. */
export function auditRoutes(app: App, service: Service): void {
  app.get(
    '/v1/audit',
    {
      config: { right: 'administer' },
      schema: {
        operationId: 'listAudit',
        tags: ['people'],
        summary: 'List who did what, newest first',
        description:
          'Each entry is written in the same transaction as the act itself. The entries of all clubs of a service are one chain of hashes, which the operator verifies with `npm run audit`.',
        querystring: z.strictObject(pageQuery),
        response: answers(
          { 200: jsonAnswer('A page of the audit trail.', pageSchema(auditEntrySchema)) },
          listProblems,
        ),
      },
    },
    async (request, reply) => {
      const asked = pageRequest(request, request.query);
      const page = await service.store.audit.list(principalOf(request).clubId, asked);
      return sendPage(request, reply, service, request.query, page, auditEntryToWire);
    },
  );
}
