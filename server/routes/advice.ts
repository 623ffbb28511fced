import { z } from 'zod';
import type { AdviceRequest, AdvisedAntenna } from '../advice/advice-request.ts';
import { advise } from '../advice/advise.ts';
import { trimPairs } from '../history/trims.ts';
import type { App } from '../http/app-type.ts';
import { isNotModified } from '../http/conditional.ts';
import { derivedTag } from '../http/etags.ts';
import { judgedBy, summaryMark, usableMark } from '../report-basis.ts';
import { assumptionsOf, readSweepOf, usableReport } from '../reports.ts';
import type { Service } from '../service.ts';
import { viewOf } from '../sweep-view.ts';
import { adviceBandSchema, adviceSchema, adviceToWire } from '../wire/advice.ts';
import { goalSchema } from '../wire/advice-parts.ts';
import { readHeaders } from '../wire/common.ts';
import { withEdits } from '../wire/editable.ts';
import { answers, jsonAnswer, notModified } from '../wire/problem.ts';
import { atPlane } from './asked-plane.ts';
import { findProblems } from './editables.ts';
import { planeQuery } from './sweep-reports.ts';
import { findSweepOrRefuse, sweepParams } from './sweeps.ts';

const hertz = z.coerce.number().min(1).max(1e12);
const quality = z.coerce.number().min(1).max(1e6);

const adviceQuery = z
  .strictObject({
    plane: planeQuery,
    band: adviceBandSchema
      .optional()
      .meta({ description: 'What to trim and match for; default: the first design band swept.' }),
    low_hz: hertz.optional().meta({ description: 'With high_hz: a part of the spectrum instead.' }),
    high_hz: hertz.optional(),
    target_hz: hertz
      .optional()
      .meta({ description: 'Where the antenna shall be; default: the middle of the range.' }),
    goal: goalSchema.optional().meta({
      description:
        'What to move there; default: the resonance, or the SWR minimum where the line hides it.',
    }),
    max_swr: z.coerce.number().gt(1).max(20).optional(),
    power_w: z.coerce
      .number()
      .positive()
      .max(1e6)
      .optional()
      .meta({ description: 'Net power into the feed point; without it nothing is said of it.' }),
    coil_q: quality.default(200).meta({ description: 'Q of coils (common practice, no source).' }),
    capacitor_q: quality
      .default(1000)
      .meta({ description: 'Q of capacitors (common practice, no source).' }),
    velocity_factor: z.coerce.number().positive().max(1).optional().meta({
      description:
        'Of the line that sections and stubs are cut from; default: that of the feed line.',
    }),
    length_m: z.coerce.number().positive().max(10_000).optional().meta({
      description: 'Of the whole resonant conductor, both arms of a dipole.',
    }),
    radius_m: z.coerce.number().positive().max(10).optional(),
  })
  .refine(({ low_hz, high_hz }) => (low_hz === undefined) === (high_hz === undefined), {
    message: 'Give both low_hz and high_hz, or neither.',
    path: ['high_hz'],
  })
  .refine(({ low_hz = 0, high_hz = Number.POSITIVE_INFINITY }) => low_hz < high_hz, {
    message: 'high_hz lies above low_hz.',
    path: ['high_hz'],
  })
  .refine(({ band, low_hz }) => band === undefined || low_hz === undefined, {
    message: 'Ask for a band or for low_hz and high_hz, not for both.',
    path: ['band'],
  });

function requestOf(query: z.output<typeof adviceQuery>): AdviceRequest {
  const { band, low_hz, high_hz, target_hz, goal, power_w, velocity_factor } = query;
  return {
    band: band ?? null,
    aim: low_hz === undefined || high_hz === undefined ? null : { lowHz: low_hz, highHz: high_hz },
    targetHz: target_hz ?? null,
    goal: goal ?? null,
    powerW: power_w ?? null,
    componentQ: { inductor: query.coil_q, capacitor: query.capacitor_q },
    velocityFactor: velocity_factor ?? null,
    lengthM: query.length_m ?? null,
    radiusM: query.radius_m ?? null,
  };
}

/** What to do next about an antenna. */
export function adviceRoutes(app: App, service: Service): void {
  app.get(
    '/v1/sweeps/:sweep/advice',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'getAdvice',
        tags: ['reports'],
        summary: 'What to do next: trim, match, what power does, and findings in plain words',
        params: sweepParams,
        querystring: adviceQuery,
        headers: readHeaders,
        response: answers({ 200: jsonAnswer('The advice.', adviceSchema), ...notModified }, [
          ...findProblems,
          'plane-unavailable',
        ]),
      },
    },
    async (request, reply) => {
      const record = await findSweepOrRefuse(request, service, request.params.sweep);
      const judged = await judgedBy(service, record);
      const { plane, max_swr } = request.query;
      const basis = withEdits(atPlane(judged.basis, record, plane), { maxSwr: max_swr });
      const antenna: AdvisedAntenna = {
        kind: judged.antenna.facts.kind,
        workPairs: await trimPairs(service, judged.antenna),
      };
      const asked = requestOf(request.query);
      const tag = derivedTag([
        'advice',
        record.id,
        record.revision,
        JSON.stringify([summaryMark(basis), usableMark(basis), antenna, asked]),
      ]);
      if (isNotModified(request, reply, tag)) return reply.code(304).send();
      const sweep = await readSweepOf(service, record);
      const view = viewOf(basis, sweep, assumptionsOf(record), [basis.maxSwr]);
      const report = usableReport(view, basis);
      const advice = advise({ basis, view, report, antenna, request: asked });
      const identity = { sweepId: record.id, antennaId: record.facts.antennaId };
      return reply.type('application/json').send(adviceToWire(identity, basis, advice));
    },
  );
}
