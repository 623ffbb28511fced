import { z } from 'zod';
import { principalOf } from '../auth/bearer.ts';
import type { App } from '../http/app-type.ts';
import { pageRequest, sendPage } from '../http/pages.ts';
import type { Service } from '../service.ts';
import type { SiteRecord } from '../store/port.ts';
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
  .meta({ examples: ['Hilltop'] });
const place = {
  latitude_deg: z.number().min(-90).max(90).nullable().meta({ description: 'WGS 84, north.' }),
  longitude_deg: z.number().min(-180).max(180).nullable().meta({ description: 'WGS 84, east.' }),
  elevation_m: z
    .number()
    .min(-500)
    .max(9000)
    .nullable()
    .meta({ description: 'Metres above mean sea level.' }),
};

const siteSchema = z
  .object({
    ...editableFields,
    name: nameSchema,
    ...place,
    note: noteSchema,
    invented: inventedSchema,
  })
  .meta({ id: 'Site', description: 'A place where antennas stand.' });

/** A site as it is sent. */
export type SiteWire = z.output<typeof siteSchema>;

const facts = { key: keySchema, name: nameSchema, ...place, note: noteSchema };
const createSchema = z.strictObject({
  ...facts,
  latitude_deg: place.latitude_deg.default(null),
  longitude_deg: place.longitude_deg.default(null),
  elevation_m: place.elevation_m.default(null),
  note: noteSchema.default(''),
});
const editSchema = z.strictObject(facts).partial();
const params = z.strictObject({ site: idOrKeySchema });
const tags = ['sites'];

function toWire(record: SiteRecord): SiteWire {
  return { ...editableToWire(record), ...toSnakeCase(record.facts) };
}

/** The places where the club's antennas stand. */
export function siteRoutes(app: App, service: Service): void {
  const querystring = z.strictObject(pageQuery);
  app.get(
    '/v1/sites',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'listSites',
        tags,
        summary: 'List the sites, ascending by key',
        querystring,
        response: answers(
          { 200: jsonAnswer('A page of sites.', pageSchema(siteSchema)) },
          listProblems,
        ),
      },
    },
    async (request, reply) => {
      const { clubId } = principalOf(request);
      const asked = pageRequest(request, request.query);
      const page = await service.store.listEditables('sites', clubId, asked);
      return sendPage(request, reply, service, request.query, page, toWire);
    },
  );

  app.post(
    '/v1/sites',
    {
      config: { right: 'keep' },
      schema: {
        operationId: 'addSite',
        tags,
        summary: 'Add a site',
        querystring: noQuery,
        body: createSchema,
        response: answers({ 201: jsonAnswer('The site that was added.', siteSchema) }, addProblems),
      },
    },
    (request, reply) => {
      const { key, ...facts } = toCamelCase(request.body);
      const fresh = { key, facts: { ...facts, invented: false } };
      return addEditable(request, reply, service, 'sites', fresh, toWire);
    },
  );

  app.get(
    '/v1/sites/:site',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'getSite',
        tags,
        summary: 'Read a site',
        params,
        querystring: noQuery,
        headers: readHeaders,
        response: answers(
          { 200: jsonAnswer('The site.', siteSchema), ...notModified },
          findProblems,
        ),
      },
    },
    async (request, reply) => {
      const record = await findOrRefuse(request, service, 'sites', request.params.site);
      return sendEditable(request, reply, record, toWire);
    },
  );

  app.patch(
    '/v1/sites/:site',
    {
      config: { right: 'keep' },
      schema: {
        operationId: 'editSite',
        tags,
        summary: 'Edit a site: fields that are left out stay',
        params,
        querystring: noQuery,
        headers: editHeaders,
        body: editSchema,
        response: answers({ 200: jsonAnswer('As it is now.', siteSchema) }, editProblems),
      },
    },
    async (request, reply) => {
      const present = await findOrRefuse(request, service, 'sites', request.params.site);
      const { key = present.key, ...edits } = toCamelCase(request.body);
      const next = { key, facts: withEdits(present.facts, edits) };
      return editEditable(request, reply, service, 'sites', present, next, toWire);
    },
  );
}
