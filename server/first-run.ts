import { makeToken, secretSha256 } from './auth/token.ts';
import type { RandomBytes } from './ids.ts';
import { type Service, timestamp } from './service.ts';
import type { Actor } from './store/port.ts';

/** What a first start makes: the club's first actor, and its token, which is shown this once. */
export interface FirstRun {
  readonly actor: Actor;
  readonly token: string;
}

export interface NewClub {
  readonly key: string;
  readonly name: string;
  readonly invented: boolean;
}

/** Makes the club and its operator's token if the store has no club yet; else null. */
export async function addFirstClub(
  service: Service,
  randomBytes: RandomBytes,
  { key, name, invented }: NewClub,
): Promise<FirstRun | null> {
  const clubs = await service.store.listClubs();
  if (clubs.length > 0) return null;
  const token = makeToken(randomBytes);
  const clubId = service.newId();
  const memberId = service.newId();
  const createdAt = timestamp(service.now);
  await service.store.addClub(
    { id: clubId, key, name, invented, createdAt },
    {
      id: service.newId(),
      clubId,
      memberId,
      label: 'operator, made at the first start',
      createdAt,
      secretSha256: secretSha256(token),
    },
  );
  return { actor: { clubId, memberId, at: createdAt }, token };
}
