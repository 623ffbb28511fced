import { makeToken, secretSha256 } from './auth/token.ts';
import type { RandomBytes } from './ids.ts';
import { type Service, timestamp } from './service.ts';
import type { Actor } from './store/port.ts';

export interface NewClub {
  readonly key: string;
  readonly name: string;
  readonly invented: boolean;
}

/** The club's first member, a steward, and their token, which is shown this once. */
export interface FirstSteward {
  readonly actor: Actor;
  readonly token: string;
}

/** Makes a club with its first steward. Throws `conflict` on a key in use. */
export async function addClub(
  { store, newId, now }: Pick<Service, 'store' | 'newId' | 'now'>,
  randomBytes: RandomBytes,
  { key, name, invented }: NewClub,
): Promise<FirstSteward> {
  const token = makeToken(randomBytes);
  const clubId = newId();
  const memberId = newId();
  const createdAt = timestamp(now);
  await store.addClub(
    { id: clubId, key, name, invented, createdAt },
    {
      id: newId(),
      clubId,
      memberId,
      label: 'made with the club',
      createdAt,
      secretSha256: secretSha256(token),
    },
  );
  return { actor: { clubId, memberId, at: createdAt }, token };
}
