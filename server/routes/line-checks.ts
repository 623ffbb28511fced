import type { FastifyRequest } from 'fastify';
import { z } from 'zod';
import type { Cable } from '../../core/line/cable.ts';
import { actorOf } from '../auth/bearer.ts';
import type { App } from '../http/app-type.ts';
import { checkContentDigest, sha256 } from '../http/digests.ts';
import { refuseFuture } from '../http/measured-at.ts';
import { pageRequest, sendPage } from '../http/pages.ts';
import { readProblem } from '../http/read-problems.ts';
import { bodyBytes, uploadedFile } from '../http/upload-body.ts';
import { ingestLineCheck } from '../ingest.ts';
import { cableLookUp, clubCablesOf } from '../lines/club-cables.ts';
import { lineBasisOf } from '../lines/line-basis.ts';
import { changesSince, type LineToCheck } from '../lines/line-check.ts';
import { lineToCheck } from '../lines/tested-line.ts';
import { Problem } from '../problems.ts';
import type { Service } from '../service.ts';
import type { AntennaRecord, LineCheckRecord } from '../store/port.ts';
import { idOrKeySchema, idSchema, noQuery, pageQuery, pageSchema } from '../wire/common.ts';
import {
  lineCheckSchema,
  lineCheckToWire,
  lineCheckWithTraceSchema,
  lineQuery,
} from '../wire/line-check.ts';
import { answers, jsonAnswer } from '../wire/problem.ts';
import { fileQuery, fileRequestBody, uploadHeaders, uploadProblems } from '../wire/upload.ts';
import { findOrRefuse, findProblems, listProblems, resolveReference } from './editables.ts';

const tags = ['line checks'];
const params = z.strictObject({ antenna: idOrKeySchema });
export const lineCheckParams = z.strictObject({ antenna: idOrKeySchema, check: idSchema });
const uploadQuery = z
  .strictObject({ ...fileQuery, ...lineQuery, analyzer: idOrKeySchema.optional() })
  .refine(({ far_end, load_ohm }) => far_end === 'loaded' || load_ohm === undefined, {
    message: 'Only a loaded end has a load.',
    path: ['load_ohm'],
  });
type UploadQuery = z.output<typeof uploadQuery>;

/** How many checks of one file, told differently, may lie between two that are compared. */
const mostRepeats = 20;

/** The line checks of an antenna, newest first, each with what changed since the one before. */
export function lineCheckRoutes(app: App, service: Service): void {
  app.get(
    '/v1/antennas/:antenna/line-checks',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'listLineChecks',
        tags,
        summary: 'List the checks of an antenna’s feed line, newest first',
        params,
        querystring: z.strictObject(pageQuery),
        response: answers({ 200: jsonAnswer('A page of checks.', pageSchema(lineCheckSchema)) }, [
          ...listProblems,
          'not-found',
        ]),
      },
    },
    async (request, reply) => {
      const antenna = await findOrRefuse(request, service, 'antennas', request.params.antenna);
      const asked = pageRequest(request, request.query);
      const page = await service.store.listLineChecks(antenna.clubId, antenna.id, asked);
      const all = [...page.items, ...(await olderThan(service, antenna, page.next))];
      return sendPage(request, reply, service, request.query, page, (record) =>
        lineCheckToWire(record, changesSince(record, all.slice(all.indexOf(record) + 1))),
      );
    },
  );

  app.get(
    '/v1/antennas/:antenna/line-checks/:check',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'getLineCheck',
        tags,
        summary: 'Read a line check with its trace',
        params: lineCheckParams,
        querystring: noQuery,
        response: answers(
          { 200: jsonAnswer('The check.', lineCheckWithTraceSchema) },
          findProblems,
        ),
      },
    },
    async (request, reply) => {
      const antenna = await findOrRefuse(request, service, 'antennas', request.params.antenna);
      const record = await findLineCheckOrRefuse(service, antenna, request.params.check);
      return reply.type('application/json').send(await withTrace(service, antenna, record));
    },
  );
}

/** A line check of an antenna. Throws `not-found`. */
export async function findLineCheckOrRefuse(
  service: Service,
  antenna: AntennaRecord,
  id: string,
): Promise<LineCheckRecord> {
  const record = await service.store.findLineCheck(antenna.clubId, id);
  if (record !== null && record.facts.antennaId === antenna.id) return record;
  throw new Problem('not-found', { detail: `The antenna has no line check \`${id}\`.` });
}

/** The upload of a line check; stands among the routes that take any body. */
export function lineCheckUploadRoutes(app: App, service: Service): void {
  app.post(
    '/v1/antennas/:antenna/line-checks',
    {
      config: { right: 'measure' },
      bodyLimit: service.limits.maxBytes,
      schema: {
        operationId: 'uploadLineCheck',
        tags,
        summary: 'Check a feed line by a sweep into it',
        description:
          'With the antenna taken off and the far end left open, shorted or loaded. Tells length, loss and faults, and what changed since the check before. The same bytes told in the same way are answered with the first record. Sweep wide (the span divides the distances that can be told apart) in even steps.',
        params,
        querystring: uploadQuery,
        headers: uploadHeaders,
        'x-request-body': fileRequestBody,
        response: answers(
          {
            200: jsonAnswer(
              'These bytes are kept already: the first record.',
              lineCheckWithTraceSchema,
            ),
            201: jsonAnswer('The record that was made.', lineCheckWithTraceSchema),
          },
          [...uploadProblems, 'unknown-reference', 'line-check-impossible'],
        ),
      },
    },
    async (request, reply) => {
      const { query } = request;
      const antenna = await findOrRefuse(request, service, 'antennas', request.params.antenna);
      const { measured_at: measuredAt = null } = query;
      refuseFuture(measuredAt, service.now());
      const analyzerId = await analyzerIdOf(request, service, query.analyzer);
      const line = await toldLine(service, antenna, query);
      checkContentDigest(request.headers['content-digest'], bodyBytes(request));
      const { bytes, fileName } = await uploadedFile(request, service.limits.maxBytes);
      const { clubId, memberId, at } = actorOf(request, service);
      const incoming = {
        id: service.newId(),
        clubId,
        receivedAt: at,
        uploadedBy: memberId,
        bytes,
        fileSha256: sha256(bytes).toString('hex'),
        fileName: query.file_name ?? fileName,
        columns: query.columns ?? null,
        port: query.port ?? null,
        limits: service.limits,
      };
      const { note } = query;
      const facts = { antennaId: antenna.id, analyzerId, measuredAt, note, invented: false };
      const made = ingestLineCheck(incoming, line, facts);
      if (!made.ok) {
        throw 'unreadable' in made.error
          ? readProblem(made.error.unreadable)
          : impossible(made.error.impossible);
      }
      const { outcome, record } = await service.store.addLineCheck(made.value);
      return reply
        .code(outcome === 'added' ? 201 : 200)
        .header(
          'location',
          `${service.publicUrl}/v1/antennas/${antenna.id}/line-checks/${record.id}`,
        )
        .type('application/json')
        .send(await withTrace(service, antenna, record));
    },
  );
}

async function analyzerIdOf(
  request: FastifyRequest,
  service: Service,
  analyzer: string | undefined,
): Promise<string | null> {
  if (analyzer === undefined) return null;
  const place = { parameter: 'analyzer' };
  return (await resolveReference(request, service, 'analyzers', analyzer, place)).id;
}

/** The line that a query tells of, completed from the antenna's record. */
async function toldLine(
  service: Service,
  { clubId, facts }: AntennaRecord,
  query: UploadQuery,
): Promise<LineToCheck> {
  const own = await clubCablesOf(service, clubId, facts.feedLine);
  const recorded = lineBasisOf(facts.feedLine, own).resolved;
  const told = lineToCheck(
    {
      farEnd: query.far_end === 'shorted' ? 'short' : query.far_end,
      loadOhm: query.load_ohm ?? null,
      cable: await cableOrRefuse(service, clubId, query.cable),
      lengthM: query.known_length_m,
      lengthU95M: query.known_length_u95_m,
      velocityFactor: query.velocity_factor,
      velocityFactorU95: query.velocity_factor_u95,
      window: query.window,
      compensateLoss: query.compensate_loss,
    },
    recorded.ok ? recorded.value : null,
  );
  if (!told.ok) throw impossible(told.error);
  return told.value;
}

async function cableOrRefuse(
  service: Service,
  clubId: string,
  name: string | undefined,
): Promise<Cable | undefined> {
  if (name === undefined) return undefined;
  const own = await service.store.findCable(clubId, name);
  const cable = cableLookUp(own === null ? [] : [own])(name);
  if (cable !== null) return cable;
  throw new Problem('unknown-reference', {
    errors: [
      { detail: `There is no cable \`${name}\`; /v1/cables has them all.`, parameter: 'cable' },
    ],
  });
}

function impossible({ code, detail }: { readonly code: string; readonly detail: string }): Problem {
  return new Problem('line-check-impossible', { detail, members: { code } });
}

async function withTrace(
  service: Service,
  antenna: AntennaRecord,
  record: LineCheckRecord,
): Promise<string> {
  const trace = await service.store.readLineCheckTrace(record.clubId, record.id);
  if (trace === null) throw new Problem('record-corrupt');
  const { facts, receivedAt, id } = record;
  const older = await olderThan(service, antenna, [facts.measuredAt ?? receivedAt, id]);
  const wire = lineCheckToWire(record, changesSince(record, older));
  return `${JSON.stringify(wire).slice(0, -1)},"trace":${trace}}`;
}

/** The checks before a place in the list, as many as a comparison needs. */
async function olderThan(
  service: Service,
  { clubId, id }: AntennaRecord,
  after: readonly [string, string] | null,
): Promise<readonly LineCheckRecord[]> {
  if (after === null) return [];
  const page = { limit: mostRepeats, after };
  return (await service.store.listLineChecks(clubId, id, page)).items;
}
