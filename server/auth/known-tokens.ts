import type { KnownToken } from '../store/people.ts';
import type { Store } from '../store/port.ts';
import { isWellFormedToken, secretSha256 } from './token.ts';

const mostKept = 1000;

/**
 * Looks tokens up, and need not look again while nothing was written: a client sends the same one
 * with each request. A revocation or a new role is a write. Kept by their hash only, as everywhere.
 */
export class KnownTokens {
  private readonly store: Store;
  private readonly kept = new Map<string, KnownToken>();
  private version = -1;

  constructor(store: Store) {
    this.store = store;
  }

  /** Null for what is malformed, unknown or revoked. */
  async find(token: string): Promise<KnownToken | null> {
    if (!isWellFormedToken(token)) return null;
    const version = this.store.version();
    if (version !== this.version || this.kept.size >= mostKept) {
      this.kept.clear();
      this.version = version;
    }
    const hash = secretSha256(token);
    const name = Buffer.from(hash).toString('latin1');
    const kept = this.kept.get(name);
    if (kept !== undefined) return kept;
    const known = await this.store.findToken(hash);
    // Read later than the version: what was written in between may be missing from it, not in it.
    if (known !== null && this.version === version) this.kept.set(name, known);
    return known;
  }
}
