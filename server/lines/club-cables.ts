import { type Cable, type CableError, fitCable } from '../../core/line/cable.ts';
import { findCable } from '../../core/line/cables.ts';
import type { FeedLineSection } from '../../core/line/feed-line.ts';
import type { Result } from '../../core/result.ts';
import type { Service } from '../service.ts';
import type { CableFacts, CableRecord } from '../store/port.ts';

/** A club's own cable as calculations take it. Errors as `fitCable`. */
export function fitClubCable(key: string, facts: CableFacts): Result<Cable, CableError> {
  const { characteristicU95Ohm, velocityFactorU95, lossU95Fraction } = facts;
  return fitCable({
    id: key,
    name: facts.name,
    characteristicOhm: facts.characteristicOhm,
    velocityFactor: facts.velocityFactor,
    points: facts.points,
    ...(characteristicU95Ohm === null ? {} : { characteristicU95Ohm }),
    ...(velocityFactorU95 === null ? {} : { velocityFactorU95 }),
    ...(lossU95Fraction === null ? {} : { lossU95Fraction }),
  });
}

/** The cable of a record, which was fitted before it was kept. */
export function cableOfRecord({ key, facts }: CableRecord): Cable {
  const fitted = fitClubCable(key, facts);
  if (!fitted.ok) throw new Error(`The kept cable ${key} cannot be fitted: ${fitted.error.detail}`);
  return fitted.value;
}

/** The club's own cables among those that a feed line names; a club has none twice. */
export async function clubCablesOf(
  service: Pick<Service, 'store'>,
  clubId: string,
  feedLine: readonly FeedLineSection[] | null,
): Promise<readonly CableRecord[]> {
  const names = new Set((feedLine ?? []).map(({ cable }) => cable));
  const found = await Promise.all([...names].map((name) => service.store.findCable(clubId, name)));
  return found.flatMap((record) => record ?? []);
}

/** Looks a cable up by name: the club's own go first, so that a longer list changes no answer. */
export function cableLookUp(own: readonly CableRecord[]): (name: string) => Cable | null {
  const byName = new Map<string, Cable>();
  for (const record of own) {
    const cable = cableOfRecord(record);
    byName.set(record.key, cable).set(record.id, cable);
  }
  return (name) => byName.get(name) ?? findCable(name);
}
