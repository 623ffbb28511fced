import type { FastifyReply, FastifyRequest } from 'fastify';
import { z } from 'zod';
import { actorOf } from '../auth/bearer.ts';
import type { App } from '../http/app-type.ts';
import { checkContentDigest, digestField, sha256 } from '../http/digests.ts';
import { refuseFuture } from '../http/measured-at.ts';
import { readProblem } from '../http/read-problems.ts';
import { bodyBytes, uploadedFile } from '../http/upload-body.ts';
import { clubCablesOf } from '../lines/club-cables.ts';
import { Problem } from '../problems.ts';
import { reportBasisOf } from '../report-basis.ts';
import { summaryText } from '../reports.ts';
import type { Service } from '../service.ts';
import type { AnalyzerRecord, AntennaRecord, SweepFacts, SweepRecord } from '../store/port.ts';
import { idOrKeySchema } from '../wire/common.ts';
import { conditionsOf, conditionsQuery } from '../wire/conditions.ts';
import { answers, jsonAnswer } from '../wire/problem.ts';
import { planeSchema } from '../wire/summary.ts';
import { sweepWithSummaryJson, sweepWithSummarySchema } from '../wire/sweep.ts';
import { fileQuery, fileRequestBody, uploadHeaders, uploadProblems } from '../wire/upload.ts';
import { findOrRefuse, resolveReference } from './editables.ts';

const querystring = z.strictObject({
  ...fileQuery,
  analyzer: idOrKeySchema.optional(),
  conditions: z
    .string()
    .max(500)
    .optional()
    .meta({ description: 'In your own words.', examples: ['gusts from the west'] }),
  ...conditionsQuery,
  plane: planeSchema.default('measured'),
});
type UploadQuery = z.output<typeof querystring>;

/** The upload of a sweep: the one route that takes any body. */
export function uploadRoutes(app: App, service: Service): void {
  app.removeAllContentTypeParsers();
  app.addContentTypeParser('*', { parseAs: 'buffer' }, (_request, body, done) => done(null, body));
  app.post(
    '/v1/antennas/:antenna/sweeps',
    {
      config: { right: 'measure' },
      bodyLimit: service.limits.maxBytes,
      schema: {
        operationId: 'uploadSweep',
        tags: ['sweeps'],
        summary: 'Upload a sweep',
        description:
          'Keeps the file and answers where the antenna resonates and where its SWR is lowest. The same bytes again are answered with the first record, so repeating is safe. Send `Content-Digest: sha-256=:<base64>:` to have the transfer checked.',
        params: z.strictObject({ antenna: idOrKeySchema }),
        querystring,
        headers: uploadHeaders,
        'x-request-body': fileRequestBody,
        response: answers(
          {
            200: jsonAnswer(
              'These bytes are kept already: the first record.',
              sweepWithSummarySchema,
            ),
            201: jsonAnswer('The record that was made.', sweepWithSummarySchema),
          },
          [...uploadProblems, 'file-of-other-antenna', 'unknown-reference'],
        ),
      },
    },
    async (request, reply) => {
      const antenna = await findOrRefuse(request, service, 'antennas', request.params.antenna);
      const told = await toldOf(request, service, antenna, request.query);
      return keepSweep(request, reply, service, told);
    },
  );
}

async function toldOf(
  request: FastifyRequest,
  service: Service,
  antenna: AntennaRecord,
  query: UploadQuery,
): Promise<Told> {
  const { measured_at: measuredAt = null, analyzer } = query;
  refuseFuture(measuredAt, service.now());
  const place = { parameter: 'analyzer' };
  const known =
    analyzer === undefined
      ? null
      : await resolveReference(request, service, 'analyzers', analyzer, place);
  const facts: SweepFacts = {
    antennaId: antenna.id,
    analyzerId: known?.id ?? null,
    measuredAt,
    conditions: query.conditions ?? null,
    ...conditionsOf(query),
    note: query.note,
    plane: query.plane,
    invented: false,
  };
  return { antenna, analyzer: known, facts, query };
}

interface Told {
  readonly antenna: AntennaRecord;
  readonly analyzer: AnalyzerRecord | null;
  readonly facts: SweepFacts;
  readonly query: UploadQuery;
}

async function keepSweep(
  request: FastifyRequest,
  reply: FastifyReply,
  service: Service,
  { antenna, analyzer, facts, query }: Told,
): Promise<FastifyReply> {
  checkContentDigest(request.headers['content-digest'], bodyBytes(request));
  const { bytes, fileName } = await uploadedFile(request, service.limits.maxBytes);
  const { clubId, memberId, at } = actorOf(request, service);
  const fileSha256 = sha256(bytes).toString('hex');
  const known = await service.store.findSweepByFile(clubId, fileSha256);
  if (known !== null) return sendKnown(reply, service, antenna, known);

  const made = await service.ingest({
    id: service.newId(),
    clubId,
    receivedAt: at,
    uploadedBy: memberId,
    antenna,
    analyzer,
    ownCables: await clubCablesOf(service, clubId, antenna.facts.feedLine),
    facts,
    bytes,
    fileSha256,
    fileName: query.file_name ?? fileName,
    columns: query.columns ?? null,
    port: query.port ?? null,
    limits: service.limits,
  });
  if (!made.ok) throw readProblem(made.error);
  const { outcome, record } = await service.store.addSweep(made.value);
  // Somebody else's upload of the same bytes may have come first.
  if (outcome !== 'added') return sendKnown(reply, service, antenna, record);
  return sendRecord(reply.code(201), service, record, made.value.summary.summaryJson);
}

async function sendKnown(
  reply: FastifyReply,
  service: Service,
  antenna: AntennaRecord,
  record: SweepRecord,
): Promise<FastifyReply> {
  const { antennaId } = record.facts;
  if (antennaId !== antenna.id) {
    const url = sweepUrl(service, record);
    throw new Problem('file-of-other-antenna', {
      headers: { link: `<${url}>; rel="related"` },
      members: { existing: { sweep_id: record.id, antenna_id: antennaId, url } },
    });
  }
  const summaryJson = await summaryText(service, record, await reportBasisOf(service, record));
  return sendRecord(reply.code(200), service, record, summaryJson);
}

function sendRecord(
  reply: FastifyReply,
  service: Service,
  record: SweepRecord,
  summaryJson: string,
): FastifyReply {
  const body = Buffer.from(sweepWithSummaryJson(record, summaryJson));
  return reply
    .header('location', sweepUrl(service, record))
    .header('repr-digest', digestField(sha256(body)))
    .type('application/json; charset=utf-8')
    .send(body);
}

function sweepUrl(service: Service, record: SweepRecord): string {
  return `${service.publicUrl}/v1/sweeps/${record.id}`;
}
