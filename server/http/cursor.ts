import { createHash } from 'node:crypto';
import { Problem } from '../problems.ts';

/** Where a list goes on: the sort key and id of the last row that was given. */
export type Position = readonly [sortKey: string, id: string];

const version = 1;

/** An opaque cursor for a position, bound to the list it was made for (path and filters). */
export function encodeCursor(position: Position, list: string): string {
  return Buffer.from(JSON.stringify([version, listMark(list), ...position])).toString('base64url');
}

/** The position in a cursor. Throws `invalid-cursor` if it was not made for this list. */
export function decodeCursor(cursor: string, list: string): Position {
  const parts = parseArray(Buffer.from(cursor, 'base64url').toString('utf8'));
  const [made, mark, sortKey, id] = parts;
  const valid =
    parts.length === 4 &&
    made === version &&
    mark === listMark(list) &&
    typeof sortKey === 'string' &&
    typeof id === 'string';
  if (!valid) {
    throw new Problem('invalid-cursor', {
      errors: [{ detail: 'It was not made for this list.', parameter: 'cursor' }],
    });
  }
  return [sortKey, id];
}

function parseArray(text: string): unknown[] {
  try {
    const parsed: unknown = JSON.parse(text);
    return Array.isArray(parsed) ? parsed : [];
  } catch {
    return [];
  }
}

function listMark(list: string): string {
  return createHash('sha256').update(list).digest('base64url').slice(0, 8);
}
