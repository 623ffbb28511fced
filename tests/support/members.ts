import { randomBytes } from 'node:crypto';
import { addClub } from '../../server/new-club.ts';
import type { Role } from '../../server/rights.ts';
import { assertDocumented } from './contract.ts';
import type { TestApp } from './test-app.ts';

/** A member with a token of their own, added by the routes that a steward uses. */
export async function addMember(
  { call }: TestApp,
  role: Role,
  tokenFacts: Readonly<Record<string, unknown>> = {},
): Promise<{ readonly id: string; readonly tokenId: string; readonly token: string }> {
  const person = { name: `Invented ${role}`, call_sign: null, contact: 'by the door' };
  const added = await call({ method: 'POST', url: '/v1/members', payload: { role, person } });
  const { id } = added.json();
  const payload = { member: id, label: 'test', ...tokenFacts };
  const made = await call({ method: 'POST', url: '/v1/tokens', payload });
  if (made.statusCode !== 201) throw new Error(made.body);
  return { id, tokenId: made.json().id, token: made.json().token };
}

/** The header that a token is sent in. */
export function bearer(token: string) {
  return { authorization: `Bearer ${token}` };
}

/** The same service as another asks it: with their token, or with none. */
export function askedBy(club: TestApp, token: string | null): TestApp {
  return {
    ...club,
    token: token ?? '',
    call: async (request) => {
      const headers = { ...(token === null ? {} : bearer(token)), ...request.headers };
      const answer = await club.app.inject({ ...request, headers });
      assertDocumented(request.method ?? 'GET', request.url, answer);
      return answer;
    },
  };
}

/** A second club in the same service, as its steward asks. */
export async function addOtherClub(club: TestApp): Promise<TestApp> {
  const other = { key: 'other-club', name: 'Other club', invented: true };
  const { actor, token } = await addClub(club.service, randomBytes, other);
  return { ...askedBy(club, token), actor };
}
