import type { Right, Role } from '../rights.ts';

/** A token that is neither revoked nor of a member who has left, as a request is judged by it. */
export interface KnownToken {
  readonly id: string;
  readonly clubId: string;
  readonly memberId: string;
  readonly role: Role;
  /** Narrows the role; null: all that the role has. */
  readonly scopes: readonly Right[] | null;
  readonly createdAt: string;
  readonly expiresAt: string | null;
  readonly lastUsedAt: string | null;
}
