import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { addAntenna, resonatorFile, upload } from '../support/club-records.ts';
import { linearReader, partOf } from '../support/read-chart.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

let club: TestApp;
beforeAll(async () => {
  club = await makeTestApp();
  await addAntenna(club);
  for (const [month, hz] of [
    ['01', 14_150_000],
    ['03', 14_200_000],
  ] as const) {
    const answer = await upload(
      club,
      resonatorFile({ resonanceHz: hz }),
      `?measured_at=2026-${month}-01T12:00:00Z`,
    );
    expect(answer.statusCode).toBe(201);
  }
});
afterAll(() => club.close());

const get = (query: string, headers = {}) =>
  club.call({ url: `/v1/antennas/field-20m/history/chart.svg?band=20m${query}`, headers });

describe('a chart of the history of an antenna', () => {
  it('has the resonance of each sweep', async () => {
    const { body, headers } = await get('');
    const mhz = linearReader(body, 'axis-y');
    const places = [...partOf(body, 'marks').matchAll(/M([\d.]+) ([\d.]+)l8 8/g)];
    // Marks of sweeps of unknown weather: a cross of 8 pixels about its place.
    const values = places.map(([, , y]) => mhz(Number(y) + 4));
    expect(values).toHaveLength(2);
    expect(values[0]).toBeCloseTo(14.15, 3);
    expect(values[1]).toBeCloseTo(14.2, 3);
    const table = /<http:\/\/ledger\.example([^>]*)>/.exec(String(headers['link']))?.[1] ?? '';
    expect((await club.call({ url: table })).headers['content-type']).toContain('text/csv');
  });

  it.each(['minimum', 'swr', 'width'])('can be of %s', async (measure) => {
    const { statusCode, body } = await get(`&measure=${measure}`);
    expect(statusCode).toBe(200);
    expect(body).toContain('2 values');
  });

  it('is another one after a sweep was added, and otherwise not sent again', async () => {
    const { headers } = await get('&from=2026-01-01T00:00:00Z');
    const known = { 'if-none-match': String(headers.etag) };
    expect((await get('&from=2026-01-01T00:00:00Z', known)).statusCode).toBe(304);
    await upload(
      club,
      resonatorFile({ resonanceHz: 14_210_000 }),
      '?measured_at=2026-05-01T12:00:00Z',
    );
    expect((await get('&from=2026-01-01T00:00:00Z', known)).statusCode).toBe(200);
  });

  it('shows the work that began an era', async () => {
    const work = await club.call({
      method: 'POST',
      url: '/v1/antennas/field-20m/work',
      payload: { kind: 'trimmed', done_at: '2026-02-01T12:00:00Z' },
    });
    expect(work.statusCode).toBe(201);
    expect(partOf((await get('')).body, 'eras')).toContain('trimmed');
  });

  it('needs a band', async () => {
    const url = '/v1/antennas/field-20m/history/chart.svg';
    expect((await club.call({ url })).statusCode).toBe(400);
  });
});
