import { z } from 'zod';
import type { App } from '../http/app-type.ts';
import { derivedTag } from '../http/etags.ts';
import { KeptAnswers } from '../http/kept-answers.ts';
import { Problem } from '../problems.ts';
import { type ReportBasis, reportBasisOf, summaryMark, usableMark } from '../report-basis.ts';
import { summaryText, usableText } from '../reports.ts';
import type { Service } from '../service.ts';
import type { SweepRecord } from '../store/port.ts';
import { lineToRemove } from '../sweep-view.ts';
import { readHeaders } from '../wire/common.ts';
import { withEdits } from '../wire/editable.ts';
import { answers, jsonAnswer, notModified } from '../wire/problem.ts';
import { planeSchema, summarySchema } from '../wire/summary.ts';
import { usableSchema } from '../wire/usable.ts';
import { atPlane } from './asked-plane.ts';
import { findProblems } from './editables.ts';
import { planFaults } from './plan-reference.ts';
import { asOfQuery, findSweepOrRefuse, sweepParams } from './sweeps.ts';

const tags = ['reports'];
export const planeQuery = planeSchema
  .optional()
  .meta({ description: "The plane of the answer; default: the sweep's own." });
const referenceQuery = z.coerce
  .number()
  .positive()
  .max(10_000)
  .optional()
  .meta({ description: "What SWR refers to, in ohms; default: the antenna's reference." });

/** Refuses another reference for a sweep that cannot be moved to it. Throws `phase-unknown`. */
function refuseOtherReference({ measured }: SweepRecord, referenceOhm: number | undefined): void {
  if (measured.phase !== 'none' || referenceOhm === undefined) return;
  if (referenceOhm === measured.referenceOhm) return;
  throw new Problem('phase-unknown', {
    detail: `Without phase SWR is known against ${measured.referenceOhm} ohm only.`,
    errors: [{ detail: 'Not known against this.', parameter: 'reference_ohm' }],
  });
}

/** What follows from a sweep: its summary and its usable-band report. */
export function sweepReportRoutes(app: App, service: Service): void {
  const kept = new KeptAnswers(service.store);
  app.get(
    '/v1/sweeps/:sweep/summary',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'getSummary',
        tags,
        summary: 'Where the antenna resonates, and where its SWR is lowest',
        params: sweepParams,
        querystring: z.strictObject({
          plane: planeQuery,
          reference_ohm: referenceQuery,
          as_of: asOfQuery,
        }),
        headers: readHeaders,
        response: answers({ 200: jsonAnswer('The summary.', summarySchema), ...notModified }, [
          ...findProblems,
          'plane-unavailable',
          'phase-unknown',
        ]),
      },
    },
    (request, reply) =>
      kept.send(request, reply, async () => {
        const { plane, reference_ohm, as_of } = request.query;
        const record = await findSweepOrRefuse(request, service, request.params.sweep, as_of);
        refuseOtherReference(record, reference_ohm);
        const own = await reportBasisOf(service, record);
        const basis = atPlane(withEdits(own, { referenceOhm: reference_ohm }), record, plane);
        const mark = JSON.stringify(summaryMark(basis));
        return {
          tag: derivedTag(['summary', record.id, record.revision, basis.analysisVersion, mark]),
          text: () => summaryText(service, record, basis),
        };
      }),
  );

  app.get(
    '/v1/sweeps/:sweep/usable',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'getUsable',
        tags,
        summary: 'Which part of each band is usable',
        params: sweepParams,
        querystring: z.strictObject({
          max_swr: z.coerce
            .number()
            .gt(1)
            .max(20)
            .optional()
            .meta({ description: "The SWR that counts as usable; default: the antenna's limit." }),
          plan: z
            .string()
            .max(40)
            .optional()
            .meta({ description: "Id of the plan; default: the antenna's." }),
          licence: z
            .string()
            .max(40)
            .optional()
            .meta({ description: "Operator class; default: the antenna's, if its plan is asked." }),
          plane: planeQuery,
          as_of: asOfQuery,
        }),
        headers: readHeaders,
        response: answers({ 200: jsonAnswer('The report.', usableSchema), ...notModified }, [
          ...findProblems,
          'plane-unavailable',
          'unknown-reference',
        ]),
      },
    },
    (request, reply) =>
      kept.send(request, reply, async () => {
        const { plane, plan, licence, max_swr, as_of } = request.query;
        const record = await findSweepOrRefuse(request, service, request.params.sweep, as_of);
        const own = atPlane(await reportBasisOf(service, record), record, plane);
        // Another plan has classes of its own, so the antenna's class does not carry over to it.
        const basis = withEdits(own, {
          maxSwr: max_swr,
          plan,
          licence: licence ?? (plan === undefined || plan === own.plan ? own.licence : null),
        });
        refuseUnknownPlan(basis);
        const line = lineToRemove(basis) === null ? null : basis.line;
        const mark = JSON.stringify({ ...usableMark(basis), line });
        return {
          tag: derivedTag(['usable', record.id, record.revision, mark]),
          text: () => usableText(service, record, basis),
        };
      }),
  );
}

function refuseUnknownPlan({ plan, licence }: ReportBasis): void {
  const errors = planFaults(plan, licence, {
    plan: { parameter: 'plan' },
    licence: { parameter: 'licence' },
  });
  if (errors.length > 0) throw new Problem('unknown-reference', { errors });
}
