import type { FastifyRequest } from 'fastify';
import { z } from 'zod';
import type { AntennaKind } from '../../core/advice/antenna-kind.ts';
import { bandsOf } from '../../core/bands/bands-of.ts';
import { bandNames } from '../../core/bands/plan.ts';
import { findPlan } from '../../core/bands/plans.ts';
import { principalOf } from '../auth/bearer.ts';
import type { App } from '../http/app-type.ts';
import { pageRequest, sendPage } from '../http/pages.ts';
import { Problem } from '../problems.ts';
import type { Service } from '../service.ts';
import type { AntennaFacts, AntennaRecord } from '../store/port.ts';
import { toCamelCase, toSnakeCase } from '../wire/case.ts';
import {
  editHeaders,
  idOrKeySchema,
  idSchema,
  inventedSchema,
  keySchema,
  noQuery,
  noteSchema,
  pageQuery,
  pageSchema,
  readHeaders,
} from '../wire/common.ts';
import { editableFields, editableToWire, withEdits } from '../wire/editable.ts';
import { sectionSchema } from '../wire/line.ts';
import { answers, jsonAnswer, notModified } from '../wire/problem.ts';
import {
  addEditable,
  addProblems,
  editEditable,
  editProblems,
  findOrRefuse,
  findProblems,
  listProblems,
  resolveReference,
  sendEditable,
} from './editables.ts';
import { planFaults } from './plan-reference.ts';

const antennaKinds = [
  'dipole',
  'loaded_dipole',
  'trap_dipole',
  'off_centre_fed',
  'end_fed',
  'vertical',
  'vertical_with_radials',
  'five_eighths_vertical',
  'loop',
  'small_loop',
  'beam',
  'other',
] as const satisfies readonly AntennaKind[];

const facts = {
  key: keySchema,
  name: z.string().min(1).max(100),
  kind: z.enum(antennaKinds),
  design_bands: z
    .array(z.enum(bandNames))
    .max(bandNames.length)
    .meta({ description: 'The bands it is meant for.' }),
  plan: z.string().max(40).meta({ description: 'Id of the plan it is judged by: /v1/plans.' }),
  licence: z
    .string()
    .max(40)
    .nullable()
    .meta({ description: 'Operator class of a licence plan; null judges by the rows of all.' }),
  max_swr: z.number().gt(1).max(20).meta({ description: 'The SWR that counts as usable.' }),
  reference_ohm: z.number().positive().max(10_000).meta({ description: 'Its SWR refers to this.' }),
  feed_line: z.array(sectionSchema).max(20).nullable().meta({
    description:
      'From the analyzer to the antenna. Null: not known. Empty: the analyzer sits at the feed point.',
  }),
  test_interval_days: z
    .int()
    .min(1)
    .max(3660)
    .nullable()
    .meta({ description: 'Days from one test to the next; null: as the club has it (/v1/due).' }),
  note: noteSchema,
};

const antennaSchema = z
  .object({
    ...editableFields,
    site_id: idSchema,
    ...facts,
    design_bands: z.array(z.string()),
    invented: inventedSchema,
  })
  .meta({ id: 'Antenna', description: 'One antenna at a site, and what it is judged by.' });

/** An antenna as it is sent. */
export type AntennaWire = z.output<typeof antennaSchema>;

const site = idOrKeySchema.meta({ description: 'Id or key of the site it stands at.' });
const createSchema = z.strictObject({
  ...facts,
  site,
  design_bands: facts.design_bands.default([]),
  licence: facts.licence.default(null),
  max_swr: facts.max_swr.default(2),
  reference_ohm: facts.reference_ohm.default(50),
  feed_line: facts.feed_line.default(null),
  test_interval_days: facts.test_interval_days.default(null),
  note: noteSchema.default(''),
});
const editSchema = z.strictObject({ ...facts, site }).partial();
const params = z.strictObject({ antenna: idOrKeySchema });
const tags = ['antennas'];

function toWire(record: AntennaRecord): AntennaWire {
  const { testIntervalDays = null, ...known } = record.facts;
  return { ...editableToWire(record), ...toSnakeCase({ ...known, testIntervalDays }) };
}

const planPlaces = { plan: { pointer: '#/plan' }, licence: { pointer: '#/licence' } };

/** Refuses a plan, class or band that there is not. */
function refuseUnknownPlan(facts: Pick<AntennaFacts, 'plan' | 'licence' | 'designBands'>): void {
  const errors = planFaults(facts.plan, facts.licence, planPlaces);
  const plan = findPlan(facts.plan);
  const known = plan === null ? [] : bandsOf(plan).map(({ band }) => band as string);
  for (const [i, band] of facts.designBands.entries()) {
    if (plan === null || known.includes(band)) continue;
    errors.push({ detail: `${plan.id} has no band ${band}.`, pointer: `#/design_bands/${i}` });
  }
  if (errors.length > 0) throw new Problem('unknown-reference', { errors });
}

/** The antennas of the club. */
export function antennaRoutes(app: App, service: Service): void {
  const querystring = z.strictObject({
    ...pageQuery,
    site: idOrKeySchema.optional().meta({ description: 'Only the antennas of this site.' }),
  });
  const siteIdOf = async (request: FastifyRequest, site: string) =>
    (await resolveReference(request, service, 'sites', site, { pointer: '#/site' })).id;
  app.get(
    '/v1/antennas',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'listAntennas',
        tags,
        summary: 'List the antennas, ascending by key',
        querystring,
        response: answers({ 200: jsonAnswer('A page of antennas.', pageSchema(antennaSchema)) }, [
          ...listProblems,
          'unknown-reference',
        ]),
      },
    },
    async (request, reply) => {
      const { clubId } = principalOf(request);
      const { site } = request.query;
      const asked = pageRequest(request, request.query);
      const filter =
        site === undefined
          ? {}
          : {
              siteId: (
                await resolveReference(request, service, 'sites', site, { parameter: 'site' })
              ).id,
            };
      const page = await service.store.listEditables('antennas', clubId, asked, filter);
      return sendPage(request, reply, service, request.query, page, toWire);
    },
  );

  app.post(
    '/v1/antennas',
    {
      config: { right: 'keep' },
      schema: {
        operationId: 'addAntenna',
        tags,
        summary: 'Add an antenna',
        querystring: noQuery,
        body: createSchema,
        response: answers({ 201: jsonAnswer('The antenna that was added.', antennaSchema) }, [
          ...addProblems,
          'unknown-reference',
        ]),
      },
    },
    async (request, reply) => {
      const { site, key, ...told } = toCamelCase(request.body);
      refuseUnknownPlan(told);
      const siteId = await siteIdOf(request, site);
      const fresh = { key, facts: { ...told, siteId, invented: false } };
      return addEditable(request, reply, service, 'antennas', fresh, toWire);
    },
  );

  app.get(
    '/v1/antennas/:antenna',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'getAntenna',
        tags,
        summary: 'Read an antenna',
        params,
        querystring: noQuery,
        headers: readHeaders,
        response: answers(
          { 200: jsonAnswer('The antenna.', antennaSchema), ...notModified },
          findProblems,
        ),
      },
    },
    async (request, reply) => {
      const record = await findOrRefuse(request, service, 'antennas', request.params.antenna);
      return sendEditable(request, reply, record, toWire);
    },
  );

  app.patch(
    '/v1/antennas/:antenna',
    {
      config: { right: 'keep' },
      schema: {
        operationId: 'editAntenna',
        tags,
        summary: 'Edit an antenna: fields that are left out stay',
        params,
        querystring: noQuery,
        headers: editHeaders,
        body: editSchema,
        response: answers({ 200: jsonAnswer('As it is now.', antennaSchema) }, [
          ...editProblems,
          'unknown-reference',
        ]),
      },
    },
    async (request, reply) => {
      const present = await findOrRefuse(request, service, 'antennas', request.params.antenna);
      const { key = present.key, site, ...edits } = toCamelCase(request.body);
      const siteId = site === undefined ? present.facts.siteId : await siteIdOf(request, site);
      const facts = withEdits({ ...present.facts, siteId }, edits);
      refuseUnknownPlan(facts);
      const next = { key, facts };
      return editEditable(request, reply, service, 'antennas', present, next, toWire);
    },
  );
}
