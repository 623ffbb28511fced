import { renormaliseSweep } from '../../core/network/renormalise.ts';
import { type ComparedSweep, type Comparison, compareSweeps } from '../../core/record/compare.ts';
import { judgedBy } from '../report-basis.ts';
import { readSweepOf } from '../reports.ts';
import type { Service } from '../service.ts';
import type { AntennaRecord, SweepRecord } from '../store/port.ts';
import { measuredRow } from './measured-rows.ts';
import { trimPairs } from './trims.ts';

/** Compares two sweeps, each at the plane at which it was taken. */
export async function comparison(
  service: Service,
  first: SweepRecord,
  second: SweepRecord,
): Promise<Comparison> {
  const { antenna } = await judgedBy(service, first);
  const other = await judgedBy(service, second);
  const isThroughLine = first.facts.plane === 'measured' && antenna.facts.feedLine?.length !== 0;
  return compareSweeps(
    await comparedSweep(service, antenna, first),
    await comparedSweep(service, other.antenna, second),
    {
      kind: antenna.facts.kind,
      trims: await trimPairs(service, antenna),
      throughLine: isThroughLine,
    },
  );
}

async function comparedSweep(
  service: Service,
  antenna: AntennaRecord,
  record: SweepRecord,
): Promise<ComparedSweep> {
  const row = await measuredRow(service, antenna, record);
  const sweep = renormaliseSweep(await readSweepOf(service, record), row.measures.referenceOhm);
  return { row, antennaId: antenna.id, sweep };
}
