import { createHash } from 'node:crypto';
import { Problem } from '../problems.ts';

/** The strong entity tag of one revision of an editable record: `"<id>.<revision>"`. */
export function revisionTag(record: { readonly id: string; readonly revision: number }): string {
  return `"${record.id}.${record.revision}"`;
}

/**
 * The strong entity tag of an answer that follows from these values alone, so that it is known
 * before the answer is computed.
 */
export function derivedTag(values: readonly (string | number | null)[]): string {
  const hash = createHash('sha256').update(JSON.stringify(values)).digest('base64url');
  return `"${hash.slice(0, 32)}"`;
}

/** Whether `If-None-Match` names the tag; compared weakly (RFC 9110, section 13.1.2). */
export function noneMatchHits(header: string | undefined, tag: string): boolean {
  if (header === undefined) return false;
  if (header.trim() === '*') return true;
  return entityTags(header).some((candidate) => candidate.replace(/^W\//, '') === tag);
}

/**
 * Checks `If-Match` against the present tag, compared strongly (RFC 9110, section 13.1.1). Throws
 * the problems `precondition-required` (no header) and `stale`.
 */
export function requireMatch(header: string | undefined, tag: string): void {
  if (header === undefined) throw new Problem('precondition-required');
  if (header.trim() === '*') return;
  if (!entityTags(header).includes(tag)) {
    throw new Problem('stale', { detail: `The present revision is ${tag}, not ${header}.` });
  }
}

function entityTags(header: string): string[] {
  return header.match(/(?:W\/)?"[^"]*"/g) ?? [];
}
