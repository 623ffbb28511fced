import { z } from 'zod';
import { eraIndexAt } from '../../core/record/work.ts';
import { actorOf } from '../auth/bearer.ts';
import { baselinesOf, erasOf } from '../history/baselines.ts';
import type { App } from '../http/app-type.ts';
import { Problem } from '../problems.ts';
import type { Service } from '../service.ts';
import type { WorkRecord } from '../store/history-store.ts';
import type { AntennaRecord } from '../store/port.ts';
import { baselinesSchema, baselinesToWire } from '../wire/baseline.ts';
import { idOrKeySchema, idSchema, noQuery } from '../wire/common.ts';
import { answers, jsonAnswer } from '../wire/problem.ts';
import { addProblems, findOrRefuse, findProblems } from './editables.ts';

const tags = ['history'];
const params = z.strictObject({ antenna: idOrKeySchema });
const path = '/v1/antennas/:antenna/baselines';

/** What later sweeps of an antenna are held against, era by era. */
export function baselineRoutes(app: App, service: Service): void {
  app.get(
    path,
    {
      config: { right: 'read' },
      schema: {
        operationId: 'listBaselines',
        tags,
        summary: 'What each era of an antenna began with, oldest first',
        description:
          'The median of the first three good sweeps in dry weather after the work that began the era, or of those that a member chose.',
        params,
        querystring: noQuery,
        response: answers({ 200: jsonAnswer('The eras.', baselinesSchema) }, findProblems),
      },
    },
    async (request) => {
      const antenna = await findOrRefuse(request, service, 'antennas', request.params.antenna);
      return baselinesToWire(await baselinesOf(service, antenna));
    },
  );

  app.post(
    path,
    {
      config: { right: 'keep' },
      schema: {
        operationId: 'chooseBaseline',
        tags,
        summary: 'Choose the sweeps that an era is held against',
        description: 'No sweeps at all make the baseline of the era automatic again.',
        params,
        querystring: noQuery,
        body: z.strictObject({
          era: z.int().min(0).meta({ description: '0 is the time before the first work.' }),
          sweeps: z.array(idSchema).max(20),
        }),
        response: answers({ 200: jsonAnswer('The eras as they are now.', baselinesSchema) }, [
          ...addProblems,
          'not-found',
          'unknown-reference',
        ]),
      },
    },
    async (request) => {
      const antenna = await findOrRefuse(request, service, 'antennas', request.params.antenna);
      const { era, sweeps } = request.body;
      const eras = await erasOf(service, antenna);
      const begunBy = eras[era];
      if (begunBy === undefined) throw unknown('#/era', `The antenna has ${eras.length} era(s).`);
      await refuseOthers(service, antenna, eras, request.body);
      const chosen = { era: begunBy?.id ?? '', sweepIds: [...new Set(sweeps)] };
      await service.store.chooseBaseline(actorOf(request, service), antenna.id, chosen);
      return baselinesToWire(await baselinesOf(service, antenna));
    },
  );
}

/** Refuses sweeps of another antenna or era. Throws `unknown-reference`. */
async function refuseOthers(
  service: Service,
  antenna: AntennaRecord,
  eras: readonly (WorkRecord | null)[],
  { era, sweeps }: { readonly era: number; readonly sweeps: readonly string[] },
): Promise<void> {
  const startsMs = eras.flatMap((work) => (work === null ? [] : [Date.parse(work.doneAt)]));
  for (const [i, id] of sweeps.entries()) {
    const record = await service.store.findSweep(antenna.clubId, id);
    const at = `#/sweeps/${i}`;
    if (record?.facts.antennaId !== antenna.id) {
      throw unknown(at, `The antenna has no sweep \`${id}\`.`);
    }
    const measuredAtMs = Date.parse(record.facts.measuredAt ?? record.receivedAt);
    const own = eraIndexAt(startsMs, measuredAtMs);
    if (own !== era) throw unknown(at, `The sweep is of era ${own}, not ${era}.`);
  }
}

function unknown(pointer: string, detail: string): Problem {
  return new Problem('unknown-reference', { errors: [{ detail, pointer }] });
}
