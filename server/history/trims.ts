import type { TrimPair } from '../../core/advice/trim-history.ts';
import { type TrimOccasion, trimPairsOf } from '../../core/record/trim-pairs.ts';
import { startsEra } from '../../core/record/work.ts';
import type { Service } from '../service.ts';
import type { AntennaRecord } from '../store/port.ts';
import { measuredRows } from './measured-rows.ts';

/** So many sweeps on each side of the work are looked at for a pair by one analyzer. */
const mostOnASide = 10;

/** What each known change of an antenna's length did to its frequency, oldest first. */
export async function trimPairs(
  service: Service,
  antenna: AntennaRecord,
): Promise<readonly TrimPair[]> {
  const work = (await service.store.allWork(antenna.clubId, antenna.id)).filter(({ facts }) =>
    startsEra(facts.kind),
  );
  const occasions: TrimOccasion[] = [];
  for (const [i, { doneAt, facts }] of work.entries()) {
    const { lengthChangeM } = facts;
    if (lengthChangeM === null) continue;
    const from = work[i - 1]?.doneAt;
    const until = work[i + 1]?.doneAt;
    const earlier = { ...(from === undefined ? {} : { from }), until: doneAt };
    const later = { from: doneAt, ...(until === undefined ? {} : { until }) };
    const before = await measuredRows(service, antenna, earlier, mostOnASide);
    const after = await measuredRows(service, antenna, later, mostOnASide, 'oldest_first');
    occasions.push({
      lengthChangeM,
      before: before.map(({ row }) => row),
      after: after.map(({ row }) => row),
    });
  }
  return trimPairsOf(occasions);
}
