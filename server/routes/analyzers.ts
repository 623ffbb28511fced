import type { FastifyRequest } from 'fastify';
import { z } from 'zod';
import { lacking, principalOf } from '../auth/bearer.ts';
import type { App } from '../http/app-type.ts';
import { pageRequest, sendPage } from '../http/pages.ts';
import type { Service } from '../service.ts';
import type { AnalyzerRecord } from '../store/port.ts';
import { toCamelCase, toSnakeCase } from '../wire/case.ts';
import {
  editHeaders,
  idOrKeySchema,
  inventedSchema,
  keySchema,
  noQuery,
  noteSchema,
  pageQuery,
  pageSchema,
  readHeaders,
} from '../wire/common.ts';
import { editableFields, editableToWire, withEdits } from '../wire/editable.ts';
import { answers, jsonAnswer, notModified } from '../wire/problem.ts';
import { residualErrorsSchema } from '../wire/residual-errors.ts';
import {
  addEditable,
  addProblems,
  editEditable,
  editProblems,
  findOrRefuse,
  findProblems,
  listProblems,
  sendEditable,
} from './editables.ts';

const nameSchema = z
  .string()
  .min(1)
  .max(100)
  .meta({ description: 'What the members call it.', examples: ['Bench analyzer'] });

const analyzerSchema = z
  .object({
    ...editableFields,
    name: nameSchema,
    residual_errors: residualErrorsSchema.nullable(),
    note: noteSchema,
    invented: inventedSchema,
  })
  .meta({ id: 'Analyzer', description: 'One instrument that takes sweeps.' });

/** An analyzer as it is sent. */
export type AnalyzerWire = z.output<typeof analyzerSchema>;

const facts = {
  key: keySchema,
  name: nameSchema,
  residual_errors: residualErrorsSchema.nullable(),
  note: noteSchema,
};
const createSchema = z.strictObject({
  ...facts,
  residual_errors: facts.residual_errors.default(null),
  note: noteSchema.default(''),
});
const editSchema = z.strictObject(facts).partial();
const params = z.strictObject({ analyzer: idOrKeySchema });
const tags = ['analyzers'];

function toWire(record: AnalyzerRecord): AnalyzerWire {
  return { ...editableToWire(record), ...toSnakeCase(record.facts) };
}

/** The instruments of the club. */
export function analyzerRoutes(app: App, service: Service): void {
  const querystring = z.strictObject(pageQuery);
  app.get(
    '/v1/analyzers',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'listAnalyzers',
        tags,
        summary: 'List the analyzers, ascending by key',
        querystring,
        response: answers(
          { 200: jsonAnswer('A page of analyzers.', pageSchema(analyzerSchema)) },
          listProblems,
        ),
      },
    },
    async (request, reply) => {
      const { clubId } = principalOf(request);
      const asked = pageRequest(request, request.query);
      const page = await service.store.listEditables('analyzers', clubId, asked);
      return sendPage(request, reply, service, request.query, page, toWire);
    },
  );

  app.post(
    '/v1/analyzers',
    {
      config: { right: 'measure' },
      schema: {
        operationId: 'addAnalyzer',
        tags,
        summary: 'Add an analyzer',
        querystring: noQuery,
        body: createSchema,
        response: answers(
          { 201: jsonAnswer('The analyzer that was added.', analyzerSchema) },
          addProblems,
        ),
      },
    },
    (request, reply) => {
      const { key, ...facts } = request.body;
      const fresh = { key, facts: { ...toCamelCase(facts), invented: false } };
      return addEditable(request, reply, service, 'analyzers', fresh, toWire);
    },
  );

  app.get(
    '/v1/analyzers/:analyzer',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'getAnalyzer',
        tags,
        summary: 'Read an analyzer',
        params,
        querystring: noQuery,
        headers: readHeaders,
        response: answers(
          { 200: jsonAnswer('The analyzer.', analyzerSchema), ...notModified },
          findProblems,
        ),
      },
    },
    async (request, reply) => {
      const record = await findOrRefuse(request, service, 'analyzers', request.params.analyzer);
      return sendEditable(request, reply, record, toWire);
    },
  );

  app.patch(
    '/v1/analyzers/:analyzer',
    {
      config: { right: 'measure' },
      schema: {
        operationId: 'editAnalyzer',
        tags,
        summary: 'Edit an analyzer: fields that are left out stay',
        description:
          'The right `measure` is enough for an analyzer that one added oneself; others need `keep`.',
        params,
        querystring: noQuery,
        headers: editHeaders,
        body: editSchema,
        response: answers({ 200: jsonAnswer('As it is now.', analyzerSchema) }, editProblems),
      },
    },
    async (request, reply) => {
      const present = await findOrRefuse(request, service, 'analyzers', request.params.analyzer);
      await refuseOthersAnalyzer(request, service, present.id);
      const { key = present.key, ...edits } = request.body;
      const next = { key, facts: withEdits(present.facts, toCamelCase(edits)) };
      return editEditable(request, reply, service, 'analyzers', present, next, toWire);
    },
  );
}

/** Without the right to keep, only what one added oneself. Throws `insufficient-right`. */
async function refuseOthersAnalyzer(
  request: FastifyRequest,
  { store }: Service,
  id: string,
): Promise<void> {
  const { clubId, memberId, rights } = principalOf(request);
  if (rights.has('keep')) return;
  if ((await store.whoAdded('analyzers', clubId, id)) !== memberId) throw lacking('keep');
}
