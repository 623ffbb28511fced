import type { Role } from '../../server/rights.ts';
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
