import { Webhook } from 'standardwebhooks';
import type { RandomBytes } from '../ids.ts';
import type { ToldEvent } from '../store/events.ts';
import { eventToWire } from '../wire/event.ts';
import type { Message } from './send.ts';

const secretBytes = 32;

/** A new signing secret in the form of the Standard Webhooks specification: 24 to 64 bytes. */
export function makeSecret(randomBytes: RandomBytes): string {
  return `whsec_${Buffer.from(randomBytes(secretBytes)).toString('base64')}`;
}

/**
 * An event as a signed message (Standard Webhooks specification, symmetric signature `v1`). Its id
 * is the same in each attempt, so that a receiver can tell a repetition.
 */
export function messageOf(
  webhook: { readonly id: string; readonly url: string; readonly secret: string },
  event: ToldEvent,
  nowMs: number,
  publicUrl: string,
): Message {
  const { id, url, secret } = webhook;
  const body = JSON.stringify({
    type: event.kind,
    timestamp: event.at,
    data: eventToWire(event, publicUrl),
  });
  const messageId = `evt_${id.replaceAll('-', '')}_${event.seq}`;
  return {
    url,
    body,
    headers: {
      'content-type': 'application/json',
      'user-agent': 'sweep-ledger',
      'webhook-id': messageId,
      'webhook-timestamp': String(Math.floor(nowMs / 1000)),
      'webhook-signature': new Webhook(secret).sign(messageId, new Date(nowMs), body),
    },
  };
}
