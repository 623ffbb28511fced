import type { FastifyReply, FastifyRequest } from 'fastify';
import type { Service } from '../service.ts';
import type { Page, PageRequest } from '../store/port.ts';
import { decodeCursor, encodeCursor } from './cursor.ts';

interface PageQuery {
  readonly limit: number;
  readonly cursor?: string | undefined;
}

/** What identifies a list to its cursors: the path and the filters, but neither limit nor cursor. */
function listOf(request: FastifyRequest): string {
  const url = new URL(request.url, 'http://list');
  url.searchParams.delete('limit');
  url.searchParams.delete('cursor');
  url.searchParams.sort();
  return `${url.pathname}?${url.searchParams}`;
}

/** The page that a request asks the store for. Throws `invalid-cursor`. */
export function pageRequest(request: FastifyRequest, query: PageQuery): PageRequest {
  const after = query.cursor === undefined ? null : decodeCursor(query.cursor, listOf(request));
  return { limit: query.limit, after };
}

/** Answers with a page: `{items, page}` and, where there is more, `Link` with `rel="next"`. */
export function sendPage<Row, Item>(
  request: FastifyRequest,
  reply: FastifyReply,
  service: Service,
  query: PageQuery,
  page: Page<Row>,
  toWire: (row: Row) => Item,
): { items: Item[]; page: { next: string | null; limit: number } } {
  const next = page.next === null ? null : encodeCursor(page.next, listOf(request));
  if (next !== null) {
    const url = new URL(service.publicUrl + request.url);
    url.searchParams.set('cursor', next);
    reply.header('link', `<${url}>; rel="next"`);
  }
  return { items: page.items.map(toWire), page: { next, limit: query.limit } };
}
