import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { EventStore } from '../../server/store/events.ts';
import { addAntenna, resonatorFile, upload } from '../support/club-records.ts';
import { EventSourceReader } from '../support/event-source.ts';
import { makeTestApp, type TestApp, testUrl } from '../support/test-app.ts';

let club: TestApp;
let origin: string;
let reads: number;
const hangUp: AbortController[] = [];

beforeEach(async () => {
  reads = 0;
  club = await makeTestApp({
    heartbeatMs: 5,
    around: (store) =>
      new Proxy(store, {
        get: (target, name) => {
          if (name === 'listEvents') {
            return (...args: Parameters<EventStore['listEvents']>) => {
              reads += 1;
              return target.listEvents(...args);
            };
          }
          const member: unknown = Reflect.get(target, name);
          return typeof member === 'function' ? member.bind(target) : member;
        },
      }),
  });
  origin = await club.app.listen({ host: '127.0.0.1', port: 0 });
});
afterEach(async () => {
  for (const controller of hangUp.splice(0)) controller.abort();
  await club.close();
});

async function listen(lastEventId?: string, token = club.token) {
  const controller = new AbortController();
  hangUp.push(controller);
  const answer = await fetch(`${origin}/v1/events`, {
    headers: {
      authorization: `Bearer ${token}`,
      ...(lastEventId === undefined ? {} : { 'last-event-id': lastEventId }),
    },
    signal: controller.signal,
  });
  if (answer.body === null) throw new Error('There is no body.');
  return { answer, source: EventSourceReader.of(answer.body) };
}

const addSite = (key: string) =>
  club.call({ method: 'POST', url: '/v1/sites', payload: { key, name: key } });

describe('a listener', () => {
  it('is told of a sweep as it is kept, with the antenna that it is of', async () => {
    const antenna = await addAntenna(club);
    const { answer, source } = await listen();
    expect(answer.headers.get('content-type')).toBe('text/event-stream');
    expect(answer.headers.get('cache-control')).toBe('no-store');
    const { id } = (await upload(club, resonatorFile())).json();
    const event = await source.next();
    expect(event).toMatchObject({
      type: 'sweep_added',
      json: {
        kind: 'sweep_added',
        subject_id: id,
        antenna_id: antenna['id'],
        member_id: club.actor.memberId,
        url: `${testUrl}/v1/sweeps/${id}`,
      },
    });
    expect(event?.json['id']).toBe(event?.lastEventId);
    expect(source.retryMs).toBe(5000);
  });

  it('is told of work on an antenna', async () => {
    await addAntenna(club);
    const { source } = await listen();
    const answer = await club.call({
      method: 'POST',
      url: '/v1/antennas/field-20m/work',
      payload: { kind: 'inspected', done_at: '2026-05-20T10:00:00Z' },
    });
    expect(await source.next()).toMatchObject({
      type: 'work_added',
      json: { subject_id: answer.json().id },
    });
  });

  it('who comes back is told what was missed, each once and in order', async () => {
    await addSite('first');
    const before = await listen();
    await addSite('second');
    const seen = await before.source.next();
    hangUp.pop()?.abort();
    for (const key of ['third', 'fourth']) await addSite(key);
    const { source } = await listen(seen?.lastEventId);
    await addSite('fifth');
    const urls: unknown[] = [];
    for (let i = 0; i < 3; i++) urls.push((await source.next())?.json['url']);
    const { items } = (await club.call({ url: '/v1/sites' })).json();
    const idOf = (key: string) => items.find((site: { key: string }) => site.key === key).id;
    expect(urls).toEqual(
      ['third', 'fourth', 'fifth'].map((key) => `${testUrl}/v1/sites/${idOf(key)}`),
    );
  });

  it('knows where to go on from before anything has happened', async () => {
    const { source } = await listen();
    await addSite('first');
    const first = await source.next();
    const { source: fresh } = await listen();
    await fresh.comment();
    hangUp.pop()?.abort();
    await addSite('second');
    const { source: back } = await listen(fresh.lastEventId || first?.lastEventId);
    expect((await back.next())?.type).toBe('sites_added');
  });

  it.each([['99999'], ['abc'], ['-1'], ['']])(
    'with the unknown id `%s` is told to begin anew',
    async (id) => {
      await addSite('first');
      const { source } = await listen(id);
      const reset = await source.next();
      expect(reset?.type).toBe('reset');
      await addSite('second');
      const next = await source.next();
      expect(next?.type).toBe('sites_added');
      expect(Number(next?.lastEventId)).toBeGreaterThan(Number(reset?.lastEventId));
    },
  );

  it('who missed more than is replayed is told to begin anew', async () => {
    for (let i = 0; i < 1001; i++) {
      await club.service.store.addEditable('sites', club.actor, {
        id: club.service.newId(),
        key: `site-${i}`,
        facts: {
          name: 'Site',
          latitudeDeg: null,
          longitudeDeg: null,
          elevationM: null,
          note: '',
          invented: true,
        },
      });
    }
    const newest = await club.service.store.newestSeq();
    const late = await listen(String(newest - 1001));
    expect((await late.source.next())?.type).toBe('reset');
    const inTime = await listen(String(newest - 1000));
    expect(await inTime.source.next()).toMatchObject({
      type: 'sites_added',
      lastEventId: String(newest - 999),
    });
  });

  it('is shown that the connection lives', async () => {
    const { source } = await listen();
    expect(await source.comment()).toBe('here');
  });

  it('is not told of tokens and members', async () => {
    const { source } = await listen();
    await newToken();
    await addSite('first');
    expect((await source.next())?.type).toBe('sites_added');
  });
});

async function newToken(): Promise<{ readonly id: string; readonly token: string }> {
  const payload = { label: 'display', scopes: ['read'] };
  const answer = await club.call({ method: 'POST', url: '/v1/tokens', payload });
  const { id, token } = answer.json();
  return { id, token };
}

describe('the stream', () => {
  it('ends when its token is revoked', async () => {
    const { id, token } = await newToken();
    const { source } = await listen(undefined, token);
    await club.call({ method: 'DELETE', url: `/v1/tokens/${id}` });
    expect(await source.next()).toBeNull();
  });

  it('ends when its token expires', async () => {
    const payload = { label: 'short', expires_at: '2026-06-01T13:00:00Z' };
    const answer = await club.call({ method: 'POST', url: '/v1/tokens', payload });
    const { source } = await listen(undefined, answer.json().token);
    club.clock.ms += 2 * 3600 * 1000;
    expect(await source.next()).toBeNull();
  });

  it('ends when the service stops, which does not wait for it', async () => {
    const streams = await Promise.all([listen(), listen()]);
    await club.app.close();
    for (const { source } of streams) expect(await source.next()).toBeNull();
  });

  it('is refused without a token', async () => {
    expect((await fetch(`${origin}/v1/events`)).status).toBe(401);
  });
});

describe('many listeners', () => {
  it('cost one reading of the store for each write, and none when nobody listens', async () => {
    const streams = await Promise.all(Array.from({ length: 20 }, () => listen()));
    const before = reads;
    await addSite('first');
    for (const { source } of streams) expect((await source.next())?.type).toBe('sites_added');
    // The use of a token may be noted as well.
    expect(reads - before).toBeGreaterThanOrEqual(1);
    expect(reads - before).toBeLessThanOrEqual(3);
  });

  it('of another club hear nothing of it', async () => {
    const { source } = await listen();
    const { store, newId } = club.service;
    const other = { clubId: newId(), memberId: newId(), at: '2026-06-01T12:00:00.000Z' };
    await store.addClub(
      { id: other.clubId, key: 'other', name: 'Other', invented: true, createdAt: other.at },
      {
        id: newId(),
        clubId: other.clubId,
        memberId: other.memberId,
        label: 'first',
        createdAt: other.at,
        secretSha256: new Uint8Array(32).fill(9),
      },
    );
    await addSite('ours');
    expect(await source.next()).toMatchObject({
      type: 'sites_added',
      json: { member_id: club.actor.memberId },
    });
  });
});
