import type { FastifyRequest } from 'fastify';

/**
 * Whether a form was sent from a page of this service. Browsers say so in `Sec-Fetch-Site`; where
 * that is missing (plain HTTP on a local network) `Origin` must name the host that was asked. A
 * request with neither is not from such a page.
 */
export function isOwnForm({ headers }: Pick<FastifyRequest, 'headers'>): boolean {
  const site = headers['sec-fetch-site'];
  if (site !== undefined) return site === 'same-origin';
  const { origin, host } = headers;
  if (origin === undefined || !URL.canParse(origin)) return false;
  return new URL(origin).host === host;
}

/** The page that a form names to go on to, if it is one of this service; else the board. */
export function ownPath(text: string): string {
  return /^\/(?![/\\])[\x21-\x7e]*$/.test(text) ? text : '/';
}
