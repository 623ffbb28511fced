import { z } from 'zod';
import { actorOf, principalOf } from '../auth/bearer.ts';
import { clubIntervalDays, type DueTest, dueTests } from '../history/due-tests.ts';
import type { App } from '../http/app-type.ts';
import type { Service } from '../service.ts';
import { idSchema, noQuery, timeSchema } from '../wire/common.ts';
import { answers, commonProblems, jsonAnswer } from '../wire/problem.ts';
import { addProblems } from './editables.ts';

const tags = ['history'];
const daysSchema = z.int().min(1).max(3660).nullable();

const dueSchema = z
  .object({
    antenna_id: idSchema,
    antenna_key: z.string(),
    name: z.string(),
    site_id: idSchema,
    state: z.enum(['overdue', 'never_tested', 'due_soon', 'not_due', 'no_interval']),
    due_at: timeSchema.nullable(),
    overdue_days: z.number().nullable().meta({ description: 'Negative until it is due.' }),
    interval_days: daysSchema,
    interval_from: z.enum(['antenna', 'club', 'default']),
    last_sweep_id: idSchema.nullable().meta({ description: 'The newest good sweep.' }),
    last_tested_at: timeSchema.nullable(),
  })
  .meta({ id: 'DueTest', description: 'When an antenna is to be tested again.' });

/** When an antenna is due, as it is sent. */
export type DueWire = z.output<typeof dueSchema>;

const dueListSchema = z
  .object({
    interval_days: daysSchema.meta({
      description: 'Of antennas that have none of their own; null: these are never due.',
    }),
    items: z.array(dueSchema),
  })
  .meta({ id: 'DueTests', description: 'When the antennas are to be tested again.' });

/** When the antennas are to be tested again, and how often the club does so. */
export function dueRoutes(app: App, service: Service): void {
  const listed = async (clubId: string): Promise<z.output<typeof dueListSchema>> => ({
    interval_days: await clubIntervalDays(service, clubId),
    items: (await dueTests(service, clubId)).map(dueToWire),
  });
  app.get(
    '/v1/due',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'listDueTests',
        tags,
        summary: 'Which antennas are due for a test, the longest overdue first',
        description:
          'A test is a good sweep: one that is not noisy, cut short or of a bad calibration.',
        querystring: noQuery,
        response: answers({ 200: jsonAnswer('All antennas.', dueListSchema) }, commonProblems),
      },
    },
    (request) => listed(principalOf(request).clubId),
  );

  app.patch(
    '/v1/due',
    {
      config: { right: 'keep' },
      schema: {
        operationId: 'setTestInterval',
        tags,
        summary: 'Say how often the club tests antennas that have no interval of their own',
        querystring: noQuery,
        body: z.strictObject({ interval_days: daysSchema }),
        response: answers(
          { 200: jsonAnswer('The list as it is now.', dueListSchema) },
          addProblems,
        ),
      },
    },
    async (request) => {
      const actor = actorOf(request, service);
      await service.store.setTestInterval(actor, request.body.interval_days);
      return listed(actor.clubId);
    },
  );
}

function dueToWire({ antenna, due, intervalFrom, lastTest }: DueTest): z.output<typeof dueSchema> {
  const { id, key, facts } = antenna;
  return {
    antenna_id: id,
    antenna_key: key,
    name: facts.name,
    site_id: facts.siteId,
    state: due.state,
    due_at: due.dueAtMs === null ? null : new Date(due.dueAtMs).toISOString(),
    overdue_days: due.overdueDays === null ? null : Number(due.overdueDays.toFixed(2)),
    interval_days: due.intervalDays,
    interval_from: intervalFrom,
    last_sweep_id: lastTest?.sweepId ?? null,
    last_tested_at: lastTest === null ? null : new Date(lastTest.measuredAtMs).toISOString(),
  };
}
