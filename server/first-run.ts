import type { RandomBytes } from './ids.ts';
import { addClub, type FirstSteward, type NewClub } from './new-club.ts';
import type { Service } from './service.ts';

/** Makes the club and its first steward if the store has no club yet; else null. */
export async function addFirstClub(
  service: Service,
  randomBytes: RandomBytes,
  club: NewClub,
): Promise<FirstSteward | null> {
  const clubs = await service.store.listClubs();
  return clubs.length > 0 ? null : addClub(service, randomBytes, club);
}
