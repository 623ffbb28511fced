import type { Page, PageRequest } from '../port.ts';

/** A page of rows that were asked for with one more than the page holds. */
export function pageOf<Row, Item>(
  rows: readonly Row[],
  { limit }: PageRequest,
  toItem: (row: Row) => Item,
  keyOf: (row: Row) => readonly [string, string],
): Page<Item> {
  const shown = rows.slice(0, limit);
  const last = shown.at(-1);
  const hasMore = rows.length > limit && last !== undefined;
  return { items: shown.map(toItem), next: hasMore ? keyOf(last) : null };
}
