import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { listPlans } from '../../core/bands/plans.ts';
import { addAntenna, resonatorFile, upload } from '../support/club-records.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

let club: TestApp;
beforeAll(async () => {
  club = await makeTestApp();
});
afterAll(() => club.close());

describe('the health', () => {
  it.each(['/livez', '/readyz'])('%s is ok and kept by nobody', async (url) => {
    const answer = await club.call({ url });
    expect(answer.json()).toEqual({ status: 'ok' });
    expect(answer.headers['cache-control']).toBe('no-store');
  });
});

describe('the counters', () => {
  it('count requests by route template, never by id', async () => {
    await club.call({ url: '/v1/sites/some-place' });
    await club.call({ url: '/v1/sites/other-place' });
    const { body, headers } = await club.call({ url: '/metrics' });
    expect(headers['content-type']).toMatch(/^text\/plain; version=0\.0\.4/);
    expect(body).toContain(
      'sweep_ledger_http_request_duration_seconds_count{method="GET",route="/v1/sites/:site",status="404"} 2',
    );
    expect(body).not.toContain('some-place');
  });

  it('follow the text format of Prometheus: a type for each name, buckets that only grow', async () => {
    const { body } = await club.call({ url: '/metrics' });
    const lines = body.trimEnd().split('\n');
    const types = lines.filter((line) => line.startsWith('# TYPE '));
    expect(types.length).toBeGreaterThanOrEqual(3);
    for (const line of lines)
      expect(line).toMatch(/^(# (HELP|TYPE) \S+ .+|\S+(\{.*\})? [0-9.e+-]+)$/);
    const buckets = lines.filter((line) => /_bucket\{.*livez|_bucket\{.*\/v1\/sites/.test(line));
    const counts = buckets.slice(0, 12).map((line) => Number(line.split(' ').at(-1)));
    expect(counts).toHaveLength(12);
    expect(counts).toEqual([...counts].sort((a, b) => a - b));
  });
});

describe('the gauges of the antennas', () => {
  it('have no sample before the first sweep, and then what it measured', async () => {
    await addAntenna(club);
    const samples = async () =>
      (await club.call({ url: '/metrics' })).body
        .split('\n')
        .filter((line) => line.startsWith('sweep_ledger_antenna_'));
    expect(await samples()).toEqual([]);
    const file = resonatorFile({ lowHz: 13_950_000, highHz: 14_400_000, slopeOhmPerHz: 1e-4 });
    await upload(club, file, '?measured_at=2026-05-22T12:00:00Z');
    const found = new Map(
      (await samples()).map((line): [string, number] => {
        const [name, value] = line.split(' ');
        return [name, Number(value)];
      }),
    );
    const inBand = '{antenna="field-20m",band="20m"}';
    expect([...found.keys()]).toEqual([
      `sweep_ledger_antenna_minimum_swr${inBand}`,
      `sweep_ledger_antenna_resonance_hertz${inBand}`,
      `sweep_ledger_antenna_usable_ratio${inBand}`,
      'sweep_ledger_antenna_days_since_test{antenna="field-20m"}',
    ]);
    // A series resonator of 60 ohm at 50 ohm, ten days before the clock of the test.
    const [swr, resonanceHz, usable, days] = found.values();
    expect(swr).toBeCloseTo(1.2, 3);
    expect(resonanceHz).toBeCloseTo(14_175_000, -3);
    expect([usable, days]).toEqual([1, 10]);
  });
});

describe('the plans', () => {
  it('are all there, each row with where it was read', async () => {
    const { items } = (await club.call({ url: '/v1/plans' })).json();
    expect(items.map((plan: { id: string }) => plan.id)).toEqual(listPlans().map(({ id }) => id));
    for (const plan of items) {
      expect(plan.source).not.toBe('');
      for (const row of plan.segments) expect(row.verified).toMatch(/^(memory$|read in: )/);
    }
  });

  it('are not sent again to a client that has them', async () => {
    const { headers } = await club.call({ url: '/v1/plans' });
    const ifNoneMatch = { 'if-none-match': String(headers.etag) };
    expect((await club.call({ url: '/v1/plans', headers: ifNoneMatch })).statusCode).toBe(304);
  });
});

describe('the documentation page', () => {
  it('loads nothing from anywhere else', async () => {
    const answer = await club.app.inject({ url: '/docs' });
    expect(answer.headers['content-security-policy']).toMatch(
      /default-src 'none'; script-src 'self'/,
    );
    const sources = [...answer.body.matchAll(/(?:src|href)="([^"]+)"/g)].map(([, url]) => url);
    expect(sources.length).toBeGreaterThan(3);
    for (const source of sources) {
      const asset = await club.app.inject({ url: new URL(source, 'http://x/docs').pathname });
      expect([source, asset.statusCode]).toEqual([source, 200]);
    }
  });
});

describe('every answer', () => {
  it.each(['/livez', '/v1/sites', '/nowhere'])(
    'to %s forbids to sniff, frame and run it',
    async (url) => {
      const { headers } = await club.call({ url });
      expect(headers['x-content-type-options']).toBe('nosniff');
      expect(headers['content-security-policy']).toBe(
        "default-src 'none';base-uri 'none';frame-ancestors 'none'",
      );
      expect(headers['x-request-id']).toMatch(/^[0-9a-f-]{36}$/);
    },
  );
});
