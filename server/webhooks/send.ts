import { lookup } from 'node:dns/promises';
import { request as requestHttp } from 'node:http';
import { request as requestHttps } from 'node:https';
import { isIP } from 'node:net';
import type { Attempt } from '../store/webhooks.ts';
import { hostOf, isPublicAddress } from './target.ts';

/** All addresses of a name; throws if it has none. */
export type Resolve = (host: string) => Promise<readonly string[]>;

export interface Message {
  readonly url: string;
  readonly headers: Readonly<Record<string, string>>;
  readonly body: string;
}

/** Sends one message and tells how that ended; never throws. The signal ends the attempt. */
export type Send = (message: Message, signal: AbortSignal) => Promise<Omit<Attempt, 'at'>>;

interface SendOptions {
  readonly allowPrivate: boolean;
  readonly resolve?: Resolve;
  readonly timeoutMs?: number;
}

const answerTimeoutMs = 15_000;

/**
 * Makes a sender. A name is resolved once, each of its addresses is judged, and the connection goes
 * to one of those: a name that changes its mind in between changes nothing. No redirect is followed.
 */
export function makeSend({
  allowPrivate,
  resolve = everyAddress,
  timeoutMs = answerTimeoutMs,
}: SendOptions): Send {
  return async (message, signal) => {
    const url = new URL(message.url);
    let addresses: readonly string[];
    try {
      addresses = await resolve(hostOf(url));
    } catch {
      return { outcome: 'name_not_found', status: null };
    }
    const [address] = addresses;
    if (address === undefined) return { outcome: 'name_not_found', status: null };
    if (!allowPrivate && !addresses.every(isPublicAddress)) {
      return { outcome: 'address_not_allowed', status: null };
    }
    return post(url, address, message, AbortSignal.any([signal, AbortSignal.timeout(timeoutMs)]));
  };
}

async function everyAddress(host: string): Promise<readonly string[]> {
  const found = await lookup(host, { all: true });
  return found.map(({ address }) => address);
}

function post(
  url: URL,
  address: string,
  { headers, body }: Message,
  signal: AbortSignal,
): Promise<Omit<Attempt, 'at'>> {
  const isTls = url.protocol === 'https:';
  const host = hostOf(url);
  return new Promise((settle) => {
    const request = (isTls ? requestHttps : requestHttp)({
      host: address,
      port: url.port === '' ? (isTls ? 443 : 80) : Number(url.port),
      path: url.pathname + url.search,
      method: 'POST',
      // The certificate must be for the name; an address cannot be asked for in TLS (RFC 6066).
      ...(isTls && isIP(host) === 0 ? { servername: host } : {}),
      headers: { ...headers, host: url.host, 'content-length': Buffer.byteLength(body) },
      agent: false,
      signal,
    });
    request.once('response', (response) => {
      const status = response.statusCode ?? 0;
      // What it has to say is not read.
      response.destroy();
      settle({ outcome: outcomeOf(status), status });
    });
    request.on('error', (error) => {
      const isLate = error.name === 'AbortError' || error.name === 'TimeoutError';
      settle({ outcome: isLate ? 'no_answer_in_time' : 'no_connection', status: null });
    });
    request.end(body);
  });
}

function outcomeOf(status: number): Attempt['outcome'] {
  if (status >= 200 && status < 300) return 'delivered';
  if (status >= 300 && status < 400) return 'redirected';
  return status === 410 ? 'gone' : 'refused_by_receiver';
}
