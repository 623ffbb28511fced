import type { FastifyRequest } from 'fastify';
import { z } from 'zod';
import { principalOf } from '../auth/bearer.ts';
import type { App } from '../http/app-type.ts';
import { isNotModified } from '../http/conditional.ts';
import { digestField } from '../http/digests.ts';
import { derivedTag, noneMatchHits } from '../http/etags.ts';
import { safeFileName } from '../http/file-names.ts';
import { pageRequest, sendPage } from '../http/pages.ts';
import { Problem } from '../problems.ts';
import { type ReportBasis, reportBasisOf, summaryMark } from '../report-basis.ts';
import { summaryText } from '../reports.ts';
import type { Service } from '../service.ts';
import type { SweepRecord } from '../store/port.ts';
import {
  idOrKeySchema,
  idSchema,
  noQuery,
  pageQuery,
  pageSchema,
  readHeaders,
  timeInputSchema,
} from '../wire/common.ts';
import { answers, jsonAnswer, notModified } from '../wire/problem.ts';
import {
  sweepSchema,
  sweepToWire,
  sweepWithSummaryJson,
  sweepWithSummarySchema,
} from '../wire/sweep.ts';
import { findOrRefuse, findProblems, listProblems } from './editables.ts';

const tags = ['sweeps'];
export const sweepParams = z.strictObject({ sweep: idSchema });

/** A time of which a sweep is asked, in a query. */
export const asOfQuery = timeInputSchema.optional().meta({
  description:
    'What was told of the sweep at that time; default: what is told now. It is judged by its antenna, cables and analyzer as they are now.',
});

/** The tag of a sweep's record with its summary. */
export function recordTag(record: SweepRecord, basis: ReportBasis): string {
  const mark = JSON.stringify(summaryMark(basis));
  return derivedTag(['record', record.id, record.revision, basis.analysisVersion, mark]);
}

/** The record that a path names, as it is told now or was at a time. Throws `not-found`. */
export async function findSweepOrRefuse(
  request: FastifyRequest,
  service: Service,
  id: string,
  asOf?: string,
): Promise<SweepRecord> {
  const { clubId } = principalOf(request);
  const { store } = service;
  const record =
    asOf === undefined
      ? await store.findSweep(clubId, id)
      : await store.corrections.findAsOf(clubId, id, asOf);
  if (record === null) {
    const then = asOf === undefined ? 'has' : `had at ${asOf}`;
    throw new Problem('not-found', { detail: `The club ${then} no sweep \`${id}\`.` });
  }
  return record;
}

/** The sweeps of an antenna, a sweep's record and its file. */
export function sweepRoutes(app: App, service: Service): void {
  app.get(
    '/v1/antennas/:antenna/sweeps',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'listSweeps',
        tags,
        summary: "List an antenna's sweeps, newest first",
        params: z.strictObject({ antenna: idOrKeySchema }),
        querystring: z.strictObject(pageQuery),
        response: answers({ 200: jsonAnswer('A page of sweeps.', pageSchema(sweepSchema)) }, [
          ...listProblems,
          'not-found',
        ]),
      },
    },
    async (request, reply) => {
      const antenna = await findOrRefuse(request, service, 'antennas', request.params.antenna);
      const asked = pageRequest(request, request.query);
      const page = await service.store.listSweeps(antenna.clubId, antenna.id, asked);
      return sendPage(request, reply, service, request.query, page, sweepToWire);
    },
  );

  app.get(
    '/v1/sweeps/:sweep',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'getSweep',
        tags,
        summary: 'Read the record of a sweep',
        params: sweepParams,
        querystring: z.strictObject({ as_of: asOfQuery }),
        headers: readHeaders,
        response: answers(
          { 200: jsonAnswer('The record.', sweepWithSummarySchema), ...notModified },
          findProblems,
        ),
      },
    },
    async (request, reply) => {
      const { as_of } = request.query;
      const record = await findSweepOrRefuse(request, service, request.params.sweep, as_of);
      const basis = await reportBasisOf(service, record);
      if (isNotModified(request, reply, recordTag(record, basis))) return reply.code(304).send();
      const summary = await summaryText(service, record, basis);
      return reply.type('application/json').send(sweepWithSummaryJson(record, summary));
    },
  );

  app.get(
    '/v1/sweeps/:sweep/file',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'getSweepFile',
        tags,
        summary: 'Download the file, byte for byte as it was uploaded',
        params: sweepParams,
        querystring: noQuery,
        headers: readHeaders,
        response: answers(
          {
            ...notModified,
            200: {
              description: 'The file. `Repr-Digest` has its SHA-256.',
              content: { 'application/octet-stream': { schema: z.string() } },
            },
          },
          [...findProblems, 'record-corrupt'],
        ),
      },
    },
    async (request, reply) => {
      const record = await findSweepOrRefuse(request, service, request.params.sweep);
      const { fileSha256 } = record.measured;
      const tag = `"sha256-${fileSha256}"`;
      reply.header('etag', tag).header('cache-control', 'private, max-age=31536000, immutable');
      if (noneMatchHits(request.headers['if-none-match'], tag)) return reply.code(304).send();
      const file = await service.store.readSweepFile(record.clubId, record.id);
      if (file === null) throw new Problem('not-found');
      return reply
        .header(
          'content-disposition',
          `attachment; filename="${downloadName(record, extensionOf(record.measured))}"`,
        )
        .header('content-security-policy', "sandbox; default-src 'none'")
        .header('repr-digest', digestField(Buffer.from(fileSha256, 'hex')))
        .type('application/octet-stream')
        .send(Buffer.from(file.buffer, file.byteOffset, file.byteLength));
    },
  );
}

/** A name that tells sweeps apart in a folder: when, and the start of the file's SHA-256. */
export function downloadName(record: SweepRecord, extension: string): string {
  const { facts, measured, receivedAt } = record;
  const day = (facts.measuredAt ?? receivedAt).slice(0, 10);
  return safeFileName(`sweep-${day}-${measured.fileSha256.slice(0, 8)}`, extension);
}

function extensionOf({ format, port }: SweepRecord['measured']): string {
  if (format === 'json') return 'json';
  if (format === 'delimited') return 'csv';
  return port === null ? 's1p' : 's2p';
}
