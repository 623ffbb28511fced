import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { addAntenna, resonatorFile, upload } from '../support/club-records.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

let club: TestApp;
beforeAll(async () => {
  // Time stands at 2026-06-01.
  club = await makeTestApp();
  await addAntenna(club);
  await addAntenna(club, { key: 'often', test_interval_days: 30 });
  await addAntenna(club, { key: 'never' });
  const good = resonatorFile({ comment: 'good' });
  await upload(club, good, '?measured_at=2026-01-02T12:00:00Z');
  const cutShort = resonatorFile({ comment: 'cut short', lowHz: 14_200_000 });
  await upload(club, cutShort, '?measured_at=2026-05-30T12:00:00Z');
  const often = await club.call({
    method: 'POST',
    url: '/v1/antennas/often/sweeps?measured_at=2026-04-22T12:00:00Z',
    payload: resonatorFile({ comment: 'often' }),
    headers: { 'content-type': 'application/octet-stream' },
  });
  expect(often.statusCode).toBe(201);
});
afterAll(() => club.close());

interface Item {
  readonly antenna_key: string;
  readonly state: string;
  readonly overdue_days: number | null;
  readonly last_tested_at: string | null;
}
const list = async () => (await club.call({ url: '/v1/due' })).json();
const states = (items: readonly Item[]) =>
  items.map(({ antenna_key, state, overdue_days }) => [antenna_key, state, overdue_days]);

describe('what is due for a test', () => {
  it('is counted from the newest good sweep, by the antenna’s own interval or the usual year', async () => {
    const { interval_days, items } = await list();
    expect(interval_days).toBe(365);
    expect(states(items)).toEqual([
      ['often', 'overdue', 10],
      ['never', 'never_tested', 0],
      ['field-20m', 'not_due', -215],
    ]);
    expect(items[2].last_tested_at).toBe('2026-01-02T12:00:00.000Z');
    expect(items.map((item: { interval_from: string }) => item.interval_from)).toEqual([
      'antenna',
      'default',
      'default',
    ]);
  });

  it('follows the interval that the club sets', async () => {
    const set = (interval_days: number | null) =>
      club.call({ method: 'PATCH', url: '/v1/due', payload: { interval_days } });
    const answer = await set(100);
    expect(answer.statusCode).toBe(200);
    expect(states(answer.json().items)).toContainEqual(['field-20m', 'overdue', 50]);
    expect((await list()).interval_days).toBe(100);
    const never = await set(null);
    expect(states(never.json().items)).toEqual([
      ['often', 'overdue', 10],
      ['field-20m', 'no_interval', null],
      ['never', 'no_interval', null],
    ]);
  });

  it('follows the interval of an antenna that is edited', async () => {
    const answer = await club.call({
      method: 'PATCH',
      url: '/v1/antennas/field-20m',
      headers: { 'if-match': '*' },
      payload: { test_interval_days: 160 },
    });
    expect(answer.json().test_interval_days).toBe(160);
    const { items } = await list();
    expect(states(items)).toContainEqual(['field-20m', 'due_soon', -10]);
  });
});
