import type { FastifyRequest } from 'fastify';
import { actorOf } from '../auth/bearer.ts';
import type { App } from '../http/app-type.ts';
import { requireMatch } from '../http/etags.ts';
import { refuseFuture } from '../http/measured-at.ts';
import { reportBasisOf } from '../report-basis.ts';
import { summaryText } from '../reports.ts';
import type { Service } from '../service.ts';
import type { SweepFacts, SweepRecord } from '../store/port.ts';
import { editHeaders, noQuery } from '../wire/common.ts';
import {
  type CorrectionWire,
  correctionSchema,
  sweepRevisionsSchema,
  sweepRevisionToWire,
} from '../wire/correction.ts';
import { withEdits } from '../wire/editable.ts';
import { answers, jsonAnswer } from '../wire/problem.ts';
import { sweepWithSummaryJson, sweepWithSummarySchema } from '../wire/sweep.ts';
import { editProblems, findProblems, resolveReference } from './editables.ts';
import { findSweepOrRefuse, recordTag, sweepParams } from './sweeps.ts';

const tags = ['sweeps'];

/** Corrections of what was told of a sweep; what was measured is not theirs to change. */
export function correctionRoutes(app: App, service: Service): void {
  app.patch(
    '/v1/sweeps/:sweep',
    {
      config: { right: 'keep' },
      schema: {
        operationId: 'correctSweep',
        tags,
        summary: 'Correct what was told of a sweep: fields that are left out stay',
        description:
          'Adds a revision with its reason; the earlier ones stay readable. With `antenna` a sweep is moved that was sent to the wrong one. With `rejected_because` it stays readable but leaves every history; null takes it back.',
        params: sweepParams,
        querystring: noQuery,
        headers: editHeaders,
        body: correctionSchema,
        response: answers({ 200: jsonAnswer('As it is now.', sweepWithSummarySchema) }, [
          ...editProblems.filter((slug) => slug !== 'key-in-use'),
          'unknown-reference',
          'implausible-fact',
        ]),
      },
    },
    async (request, reply) => {
      const present = await findSweepOrRefuse(request, service, request.params.sweep);
      const tag = recordTag(present, await reportBasisOf(service, present));
      requireMatch(request.headers['if-match'], tag);
      const corrected = {
        reason: request.body.reason,
        facts: await correctedFacts(request, service, present, request.body),
      };
      const { corrections } = service.store;
      const actor = actorOf(request, service);
      const record = await corrections.correct(actor, present.id, present.revision, corrected);
      const basis = await reportBasisOf(service, record);
      const summary = await summaryText(service, record, basis);
      return reply
        .header('etag', recordTag(record, basis))
        .type('application/json')
        .send(sweepWithSummaryJson(record, summary));
    },
  );

  app.get(
    '/v1/sweeps/:sweep/revisions',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'listSweepRevisions',
        tags,
        summary: 'What was told of a sweep, and every correction of it, oldest first',
        params: sweepParams,
        querystring: noQuery,
        response: answers(
          { 200: jsonAnswer('All revisions.', sweepRevisionsSchema) },
          findProblems,
        ),
      },
    },
    async (request) => {
      const { clubId, id } = await findSweepOrRefuse(request, service, request.params.sweep);
      const revisions = await service.store.corrections.list(clubId, id);
      return { items: revisions.map(sweepRevisionToWire) };
    },
  );
}

async function correctedFacts(
  request: FastifyRequest,
  service: Service,
  { facts }: SweepRecord,
  body: CorrectionWire,
): Promise<SweepFacts> {
  const { antenna, analyzer, measured_at: measuredAt } = body;
  refuseFuture(measuredAt ?? null, service.now(), { pointer: '/measured_at' });
  const idOf = async (kind: 'antennas' | 'analyzers', idOrKey: string, pointer: string) =>
    (await resolveReference(request, service, kind, idOrKey, { pointer })).id;
  const antennaId = antenna === undefined ? undefined : await idOf('antennas', antenna, '/antenna');
  const isKept = analyzer === undefined || analyzer === null;
  const analyzerId = isKept ? analyzer : await idOf('analyzers', analyzer, '/analyzer');
  const { conditions, weather, ground, note, plane } = body;
  return withEdits(facts, {
    antennaId,
    analyzerId,
    measuredAt,
    conditions,
    weather,
    ground,
    windMS: body.wind_m_s,
    temperatureC: body.temperature_c,
    note,
    plane,
    rejectedBecause: body.rejected_because,
  });
}
