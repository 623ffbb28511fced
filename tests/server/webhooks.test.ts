import { createHmac } from 'node:crypto';
import { Webhook } from 'standardwebhooks';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { WebhookDeliveries } from '../../server/webhooks/deliveries.ts';
import { makeSend, type Resolve } from '../../server/webhooks/send.ts';
import { sendWebhooks } from '../../server/webhooks/start.ts';
import { addAntenna, resonatorFile, upload } from '../support/club-records.ts';
import { makeTestApp, type TestApp, testUrl } from '../support/test-app.ts';
import { type Receiver, startReceiver } from '../support/webhook-receiver.ts';

let club: TestApp;
let receiver: Receiver;
beforeEach(async () => {
  club = await makeTestApp({ privateWebhooks: true });
  receiver = await startReceiver();
});
afterEach(async () => {
  await receiver.close();
  await club.close();
});

const minute = 60_000;
const hour = 60 * minute;

/** What a process of the service sends with; each call stands for one that was just started. */
function deliveries(
  options: { allowPrivate?: boolean; resolve?: Resolve; timeoutMs?: number } = {},
) {
  const { store, now, publicUrl } = club.service;
  return new WebhookDeliveries({
    store,
    now,
    publicUrl,
    send: makeSend({ allowPrivate: true, ...options }),
    onFailure: (error) => {
      throw error;
    },
  });
}

const add = async (facts: Readonly<Record<string, unknown>> = {}) => {
  const payload = { url: receiver.url, ...facts };
  return (await club.call({ method: 'POST', url: '/v1/webhooks', payload })).json();
};
const read = async (id: string) => (await club.call({ url: `/v1/webhooks/${id}` })).json();
const addSite = (key: string) =>
  club.call({ method: 'POST', url: '/v1/sites', payload: { key, name: key } });

describe('what a webhook is sent', () => {
  it('is each event from its making on, once and in order', async () => {
    await addSite('before');
    await add();
    await addAntenna(club);
    const { id } = (await upload(club, resonatorFile())).json();
    await deliveries().deliverDue();
    await deliveries().deliverDue();
    const bodies = receiver.received.map(({ body }) => JSON.parse(body));
    expect(bodies.map(({ type }) => type)).toEqual([
      'sites_added',
      'antennas_added',
      'sweep_added',
    ]);
    expect(bodies[2]).toMatchObject({
      timestamp: '2026-06-01T12:00:00.000Z',
      data: { kind: 'sweep_added', subject_id: id, url: `${testUrl}/v1/sweeps/${id}` },
    });
    expect(receiver.received[0].path).toBe('/hook?x=1');
  });

  it('is signed so that a receiver of the specification takes it, and nothing that was changed', async () => {
    const { secret } = await add();
    await addSite('first');
    // The library judges by the clock of the machine.
    club.clock.ms = Date.now();
    await deliveries().deliverDue();
    const [{ headers, body }] = receiver.received;
    const signed = {
      'webhook-id': String(headers['webhook-id']),
      'webhook-timestamp': String(headers['webhook-timestamp']),
      'webhook-signature': String(headers['webhook-signature']),
    };
    const library = new Webhook(secret);
    expect(library.verify(body, signed)).toMatchObject({ type: 'sites_added' });
    expect(() => library.verify(`${body} `, signed)).toThrow();
    // By hand, as the specification has it (Standard Webhooks, "Signature scheme"): HMAC-SHA256
    // of `id.timestamp.payload` by the bytes behind `whsec_`, in base64 behind `v1,`.
    const key = Buffer.from(secret.slice('whsec_'.length), 'base64');
    expect(key.length).toBeGreaterThanOrEqual(24);
    const content = `${signed['webhook-id']}.${signed['webhook-timestamp']}.${body}`;
    const mac = createHmac('sha256', key).update(content).digest('base64');
    expect(signed['webhook-signature']).toBe(`v1,${mac}`);
    expect(headers['content-type']).toBe('application/json');
  });

  it('is only of the kinds that it asks for', async () => {
    await add({ kinds: ['antennas_added'] });
    await addAntenna(club);
    await deliveries().deliverDue();
    expect(receiver.received.map(({ body }) => JSON.parse(body).type)).toEqual(['antennas_added']);
  });
});

describe('a service that listens', () => {
  it('sends what happens as it happens, and stops with the service', async () => {
    sendWebhooks(club.app, club.service);
    await club.app.listen({ host: '127.0.0.1', port: 0 });
    const arrived = new Promise<void>((resolve) => {
      receiver.answer = (response) => {
        response.writeHead(204).end();
        resolve();
      };
    });
    await add();
    await addSite('first');
    await arrived;
    expect(receiver.received.map(({ body }) => JSON.parse(body).type)).toEqual(['sites_added']);
    await club.app.close();
  });
});

describe('a webhook whose receiver fails', () => {
  beforeEach(() => {
    receiver.answer = (response) => response.writeHead(503).end();
  });

  it('is sent the same again, later and later, across restarts, and then goes on', async () => {
    const { id } = await add();
    await addSite('first');
    await addSite('second');
    const dueAt = await deliveries().deliverDue();
    expect(dueAt).toBe(club.clock.ms + 5000);
    expect(receiver.received).toHaveLength(1);
    club.clock.ms += 4999;
    await deliveries().deliverDue();
    expect(receiver.received).toHaveLength(1);
    club.clock.ms += 1;
    expect(await deliveries().deliverDue()).toBe(club.clock.ms + 5 * minute);
    expect(await read(id)).toMatchObject({
      active: true,
      failures: 2,
      last_attempt: { outcome: 'refused_by_receiver', status: 503 },
    });
    receiver.answer = (response) => response.writeHead(200).end('fine');
    club.clock.ms += 5 * minute;
    expect(await deliveries().deliverDue()).toBeNull();
    const ids = receiver.received.map(({ headers }) => headers['webhook-id']);
    expect(ids).toHaveLength(4);
    expect(new Set(ids.slice(0, 3)).size).toBe(1);
    expect(ids[3]).not.toBe(ids[0]);
    expect(await read(id)).toMatchObject({
      failures: 0,
      next_attempt_at: null,
      last_attempt: { outcome: 'delivered', status: 200 },
    });
  });

  it('is switched off after ten failures, and begins with what is new when switched on', async () => {
    const { id } = await add();
    await addSite('first');
    let dueAt: number | null = club.clock.ms;
    let attempts = 0;
    while (dueAt !== null && attempts < 20) {
      club.clock.ms = dueAt;
      dueAt = await deliveries().deliverDue();
      attempts += 1;
    }
    expect(attempts).toBe(10);
    expect(receiver.received).toHaveLength(10);
    expect(club.clock.ms - Date.parse('2026-06-01T12:00:00Z')).toBe(5000 + 35 * minute + 75 * hour);
    const off = await club.call({ url: `/v1/webhooks/${id}` });
    expect(off.json()).toMatchObject({ active: false, failures: 10 });

    receiver.answer = (response) => response.writeHead(204).end();
    const on = await club.call({
      method: 'PATCH',
      url: `/v1/webhooks/${id}`,
      headers: { 'if-match': String(off.headers.etag) },
      payload: { active: true },
    });
    expect(on.json()).toMatchObject({ active: true, failures: 0, revision: 2 });
    await addSite('later');
    await deliveries().deliverDue();
    expect(receiver.received).toHaveLength(11);
  });

  it('is switched off at once where it is gone', async () => {
    receiver.answer = (response) => response.writeHead(410).end();
    const { id } = await add();
    await addSite('first');
    expect(await deliveries().deliverDue()).toBeNull();
    expect(await read(id)).toMatchObject({ active: false, last_attempt: { outcome: 'gone' } });
  });

  it('is not followed to another place', async () => {
    const elsewhere = await startReceiver();
    receiver.answer = (response) => response.writeHead(307, { location: elsewhere.url }).end();
    const { id } = await add();
    await addSite('first');
    await deliveries().deliverDue();
    expect(await read(id)).toMatchObject({ last_attempt: { outcome: 'redirected', status: 307 } });
    expect(elsewhere.received).toEqual([]);
    await elsewhere.close();
  });

  it('is not waited for without end', async () => {
    receiver.answer = () => {};
    const { id } = await add();
    await addSite('first');
    await deliveries({ timeoutMs: 20 }).deliverDue();
    expect(await read(id)).toMatchObject({
      last_attempt: { outcome: 'no_answer_in_time', status: null },
    });
  });

  it('does not hold up another', async () => {
    const other = await startReceiver();
    await add();
    await add({ url: other.url });
    await addSite('first');
    await deliveries().deliverDue();
    expect(other.received).toHaveLength(1);
    await other.close();
  });

  it('counts no attempt that a stop has cut', async () => {
    const { id } = await add();
    await addSite('first');
    const cut = deliveries();
    const arrived = new Promise<void>((resolve) => {
      receiver.answer = () => resolve();
    });
    cut.start();
    await arrived;
    await cut.stop();
    expect(await read(id)).toMatchObject({ failures: 0, last_attempt: null });
  });
});

describe('the address of a webhook', () => {
  it('is looked at after its name is resolved, and nothing is sent if any is private', async () => {
    const { id } = await add({ url: `http://hook.example:${receiver.port}/` });
    await addSite('first');
    const resolve: Resolve = async () => ['1.1.1.1', '127.0.0.1'];
    await deliveries({ allowPrivate: false, resolve }).deliverDue();
    expect(receiver.received).toEqual([]);
    expect(await read(id)).toMatchObject({ last_attempt: { outcome: 'address_not_allowed' } });
  });

  it('is asked for once: the connection goes to what was looked at, under the name', async () => {
    let asked = 0;
    const resolve: Resolve = async () => {
      asked += 1;
      return ['127.0.0.1'];
    };
    await add({ url: `http://hook.example:${receiver.port}/` });
    await addSite('first');
    await deliveries({ resolve }).deliverDue();
    expect(asked).toBe(1);
    expect(receiver.received[0].headers.host).toBe(`hook.example:${receiver.port}`);
  });

  it('may have no name', async () => {
    const { id } = await add({ url: 'http://hook.invalid/' });
    await addSite('first');
    const resolve: Resolve = () => Promise.reject(new Error('ENOTFOUND'));
    await deliveries({ resolve }).deliverDue();
    expect(await read(id)).toMatchObject({ last_attempt: { outcome: 'name_not_found' } });
  });
});

describe('the webhooks of a club', () => {
  it('are added, listed, read, edited and removed; the secret is shown once', async () => {
    const { secret, ...made } = await add({ note: 'to the club room' });
    expect(secret).toMatch(/^whsec_[A-Za-z0-9+/]{43}=$/);
    const { items } = (await club.call({ url: '/v1/webhooks' })).json();
    expect(items).toEqual([made]);
    expect(await read(made.id)).toEqual(made);
    const url = `/v1/webhooks/${made.id}`;
    const payload = { kinds: ['sweep_added'] };
    expect((await club.call({ method: 'PATCH', url, payload })).statusCode).toBe(428);
    const headers = { 'if-match': '"wrong"' };
    expect((await club.call({ method: 'PATCH', url, payload, headers })).statusCode).toBe(412);
    const edited = await club.call({ method: 'PATCH', url, payload, headers: { 'if-match': '*' } });
    expect(edited.json()).toMatchObject({ kinds: ['sweep_added'], note: 'to the club room' });
    expect((await club.call({ method: 'DELETE', url })).statusCode).toBe(204);
    expect((await club.call({ url })).statusCode).toBe(404);
    await addSite('first');
    await deliveries().deliverDue();
    expect(receiver.received).toEqual([]);
  });

  it('go nowhere private unless the operator allows it', async () => {
    const strict = await makeTestApp();
    const payload = { url: 'https://192.168.1.5/hook' };
    const answer = await strict.call({ method: 'POST', url: '/v1/webhooks', payload });
    expect(answer.json()).toMatchObject({ status: 422, errors: [{ pointer: '#/url' }] });
    await strict.close();
  });

  it('are for stewards', async () => {
    const payload = { label: 'display', scopes: ['read', 'keep'] };
    const { token } = (await club.call({ method: 'POST', url: '/v1/tokens', payload })).json();
    const headers = { authorization: `Bearer ${token}` };
    expect((await club.call({ url: '/v1/webhooks', headers })).statusCode).toBe(403);
  });
});
