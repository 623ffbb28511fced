import type { Page, PageRequest } from './port.ts';

/** One act on record. */
export interface AuditEntry {
  /** From 1, over all clubs, without a gap. */
  readonly seq: number;
  readonly clubId: string;
  readonly at: string;
  /** Empty: the service itself. */
  readonly memberId: string;
  readonly act: string;
  readonly subjectId: string;
  /** `done`, or the problem that it was refused with. */
  readonly outcome: string;
  /** Where it came from; null: the service itself, or erased. */
  readonly address: string | null;
  /** SHA-256 over the hash of the entry before and this one's content, hexadecimal. */
  readonly hash: string;
}

/** The part of the store that tells who did what. */
export interface AuditStore {
  /** Newest first. */
  list(clubId: string, page: PageRequest): Promise<Page<AuditEntry>>;
}
