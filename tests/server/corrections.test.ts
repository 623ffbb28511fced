import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { addAntenna, resonatorFile, upload } from '../support/club-records.ts';
import { makeTestApp, type TestApp, testUrl } from '../support/test-app.ts';

let club: TestApp;
let url: string;
let id: string;
let antenna: unknown;
let other: unknown;

beforeEach(async () => {
  club = await makeTestApp();
  antenna = (await addAntenna(club))['id'];
  other = (await addAntenna(club, { key: 'other', name: 'Other', max_swr: 1.5 }))['id'];
  id = (await upload(club, resonatorFile(), '?weather=dry&note=first')).json().id;
  url = `/v1/sweeps/${id}`;
});
afterEach(() => club.close());

const read = async (path: string) => (await club.call({ url: path })).json();
const tagOf = async () => String((await club.call({ url })).headers.etag);
const patch = (payload: object, headers: Readonly<Record<string, string>>) =>
  club.call({ method: 'PATCH', url, payload, headers });
const correct = async (facts: object) =>
  patch({ reason: 'told wrong', ...facts }, { 'if-match': await tagOf() });
const idsIn = async (key: string, list: 'sweeps' | 'history') => {
  const { items } = await read(`/v1/antennas/${key}/${list}`);
  return items.map((item: { id?: string; sweep_id?: string }) => item.id ?? item.sweep_id);
};

describe('a correction of what was told of a sweep', () => {
  it('holds from then on, and leaves what is not named', async () => {
    const answer = await correct({ note: 'second' });
    expect(answer.statusCode).toBe(200);
    expect(answer.json()).toMatchObject({ revision: 2, note: 'second', weather: 'dry' });
    expect(answer.headers.etag).toBe(await tagOf());
    expect(await read(url)).toEqual(answer.json());
  });

  it('is kept beside what was told before, with who, when and why', async () => {
    await correct({ weather: 'rain', measured_at: '2026-01-02T03:04:05Z' });
    const { items } = await read(`${url}/revisions`);
    expect(items).toMatchObject([
      { revision: 1, weather: 'dry', measured_at: null, reason: null },
      {
        revision: 2,
        weather: 'rain',
        measured_at: '2026-01-02T03:04:05.000Z',
        reason: 'told wrong',
        member_id: club.actor.memberId,
      },
    ]);
    expect(items).toHaveLength(2);
  });

  it('says why', async () => {
    const answer = await patch({ note: 'second' }, { 'if-match': await tagOf() });
    expect(answer.statusCode).toBe(400);
  });

  it('needs the tag of the record, and the present one', async () => {
    const facts = { reason: 'told wrong', note: 'second' };
    expect((await patch(facts, {})).statusCode).toBe(428);
    const before = await tagOf();
    expect((await patch(facts, { 'if-match': before })).statusCode).toBe(200);
    expect((await patch(facts, { 'if-match': before })).statusCode).toBe(412);
  });

  it('is made by one of two who read the same, decided at the writing', async () => {
    const record = await club.service.store.findSweep(club.actor.clubId, id);
    if (record === null) throw new Error('There is no sweep.');
    const corrected = { facts: record.facts, reason: 'both' };
    const { corrections } = club.service.store;
    const both = await Promise.allSettled([
      corrections.correct(club.actor, id, 1, corrected),
      corrections.correct(club.actor, id, 1, corrected),
    ]);
    expect(both.map(({ status }) => status)).toEqual(['fulfilled', 'rejected']);
    expect(both[1]).toMatchObject({ reason: { kind: 'stale' } });
  });

  it('changes nothing that was measured', async () => {
    const before = await read(url);
    await correct({ antenna: 'other', measured_at: '2026-01-02T03:04:05Z', note: 'moved' });
    const after = await read(url);
    expect(after.file).toEqual(before.file);
    expect(after.summary.resonances).toEqual(before.summary.resonances);
  });

  it('refuses an antenna that there is not, and a time that has not been', async () => {
    expect((await correct({ antenna: 'none' })).json().type).toContain('unknown-reference');
    const late = await correct({ measured_at: '2999-01-01T00:00:00Z' });
    expect(late.json().type).toContain('implausible-fact');
    expect(await read(url)).toMatchObject({ revision: 1 });
  });
});

describe('a sweep as it was told at a time', () => {
  it('has the facts of that time', async () => {
    const { received_at: received } = await read(url);
    club.clock.ms += 60_000;
    await correct({ antenna: 'other', note: 'moved' });
    const then = `as_of=${received}`;
    expect(await read(`${url}?${then}`)).toMatchObject({ revision: 1, antenna_id: antenna });
    expect(await read(`${url}/summary?${then}`)).toMatchObject({ antenna_id: antenna });
    expect(await read(`${url}/usable?${then}`)).toMatchObject({ antenna_id: antenna, max_swr: 2 });
    expect(await read(`${url}/usable`)).toMatchObject({ antenna_id: other, max_swr: 1.5 });
  });

  it('is not there before it was uploaded', async () => {
    const answer = await club.call({ url: `${url}?as_of=2001-01-01T00:00:00Z` });
    expect(answer.statusCode).toBe(404);
  });
});

describe('a sweep that was sent to the wrong antenna', () => {
  beforeEach(async () => {
    expect((await correct({ antenna: 'other' })).statusCode).toBe(200);
  });

  it('leaves the lists and the history of the one for those of the other', async () => {
    for (const list of ['sweeps', 'history'] as const) {
      expect(await idsIn('field-20m', list), list).toEqual([]);
      expect(await idsIn('other', list), list).toEqual([id]);
    }
    expect(await read('/v1/antennas/other/history?band=20m')).toMatchObject({
      items: [{ sweep_id: id }],
    });
  });

  it('is judged as its new antenna wants, in answers that name it', async () => {
    expect(await read(`${url}/summary`)).toMatchObject({ antenna_id: other });
    expect(await read(url)).toMatchObject({ summary: { antenna_id: other } });
  });

  it('is a known file at the new antenna, and one of another antenna at the old', async () => {
    const old = await upload(club, resonatorFile());
    expect(old.json().type).toBe(`${testUrl}/problems/file-of-other-antenna`);
    const again = await club.call({
      method: 'POST',
      url: '/v1/antennas/other/sweeps',
      payload: resonatorFile(),
      headers: { 'content-type': 'application/octet-stream' },
    });
    expect([again.statusCode, again.json().id]).toEqual([200, id]);
  });
});

describe('a sweep that is rejected', () => {
  it('stays readable and leaves the history, until that is taken back', async () => {
    const rejected = await correct({ rejected_because: 'a loose connector' });
    expect(rejected.json()).toMatchObject({ rejected_because: 'a loose connector' });
    expect(await idsIn('field-20m', 'history')).toEqual([]);
    expect(await idsIn('field-20m', 'sweeps')).toEqual([id]);
    await correct({ rejected_because: null });
    expect(await idsIn('field-20m', 'history')).toEqual([id]);
    expect((await read('/v1/antennas/field-20m/history?band=20m')).items).toHaveLength(1);
  });
});
