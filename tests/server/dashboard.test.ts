import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { addAntenna, resonatorFile, upload } from '../support/club-records.ts';
import { makeTestApp, type TestApp, testUrl } from '../support/test-app.ts';

let club: TestApp;
beforeAll(async () => {
  club = await makeTestApp();
  await addAntenna(club);
});
afterAll(() => club.close());

const dashboard = async () => (await club.call({ url: '/v1/dashboard' })).json();
const antenna = async () => (await dashboard()).sites[0].antennas[0];
const measuredOn = (day: string) => `?measured_at=${day}T10:00:00Z`;

/** Wide enough for the whole of the band. */
const whole = { lowHz: 13_950_000, highHz: 14_400_000 };

describe('an antenna on the dashboard', () => {
  it('is untested before its first sweep, with its links', async () => {
    const { sites } = await dashboard();
    expect(sites).toHaveLength(1);
    expect(sites[0]).toMatchObject({ key: 'field', name: 'Field' });
    const [{ id, ...standing }] = sites[0].antennas;
    expect(standing).toMatchObject({
      key: 'field-20m',
      state: 'untested',
      latest_sweep: null,
      bands: [
        { band: '20m', state: 'untested', usable_fraction: 0, minimum_swr: null, sweep: null },
      ],
      url: `${testUrl}/v1/antennas/${id}`,
      history_url: `${testUrl}/v1/antennas/${id}/history`,
    });
  });

  it('is usable by a sweep that is within the limit throughout its band', async () => {
    const file = resonatorFile({ ...whole, slopeOhmPerHz: 1e-4 });
    const { id } = (await upload(club, file, measuredOn('2026-03-01'))).json();
    const standing = await antenna();
    expect(standing).toMatchObject({ state: 'usable', latest_sweep: { id } });
    const [band] = standing.bands;
    expect(band).toMatchObject({
      state: 'usable',
      swept_fraction: 1,
      usable_fraction: 1,
      sweep: { id, measured_at: '2026-03-01T10:00:00.000Z', url: `${testUrl}/v1/sweeps/${id}` },
    });
    // A series resonator of 60 ohm at 50 ohm: 60/50, at its resonance.
    expect(band.minimum_swr).toBeCloseTo(1.2, 3);
    expect(band.resonances_hz[0]).toBeCloseTo(14_175_000, -3);
  });

  it('keeps to the newest sweep by when it was measured, not by when it came', async () => {
    const older = resonatorFile({ ...whole, resistanceOhm: 300, comment: 'an old one' });
    await upload(club, older, measuredOn('2026-01-01'));
    expect((await antenna()).state).toBe('usable');
  });

  it('is partly usable where the limit is passed within the band', async () => {
    const file = resonatorFile({ ...whole, slopeOhmPerHz: 4e-4, comment: 'narrow' });
    await upload(club, file, measuredOn('2026-03-02'));
    const standing = await antenna();
    expect(standing.state).toBe('partly_usable');
    expect(standing.bands[0].usable_fraction).toBeGreaterThan(0.5);
    expect(standing.bands[0].usable_fraction).toBeLessThan(1);
  });

  it('is judged anew by another limit', async () => {
    const headers = { 'if-match': '*' };
    const url = '/v1/antennas/field-20m';
    await club.call({ method: 'PATCH', url, headers, payload: { max_swr: 5 } });
    expect((await antenna()).state).toBe('usable');
    await club.call({ method: 'PATCH', url, headers, payload: { max_swr: 2 } });
    expect((await antenna()).state).toBe('partly_usable');
  });

  it('is held against the first good sweep of its era', async () => {
    // 60 ohm before, 75 ohm now: an SWR of 1.2, then 1.5.
    const file = resonatorFile({ ...whole, resistanceOhm: 75, slopeOhmPerHz: 1e-4, comment: '75' });
    await upload(club, file, measuredOn('2026-03-02').replace('T10', 'T11'));
    const work = { kind: 'element_replaced', done_at: '2026-02-01T10:00:00Z' };
    const url = '/v1/antennas/field-20m/work';
    expect((await club.call({ method: 'POST', url, payload: work })).statusCode).toBe(201);
    // All three sweeps since then make the baseline.
    expect((await antenna()).bands[0].change).toBeNull();
    const again = resonatorFile({ ...whole, resistanceOhm: 75, slopeOhmPerHz: 1e-4, comment: '2' });
    await upload(club, again, measuredOn('2026-03-02').replace('T10', 'T12'));
    const third = resonatorFile({ ...whole, resistanceOhm: 90, slopeOhmPerHz: 1e-4, comment: '3' });
    await upload(club, third, measuredOn('2026-03-02').replace('T10', 'T13'));
    const [{ change }] = (await antenna()).bands;
    expect(change.minimum_swr.value).toBeCloseTo(1.8 - 1.2, 2);
    expect(Math.abs(change.resonance_hz.value)).toBeLessThan(1000);
    expect(['changed', 'unknown']).toContain(change.verdict);
  });

  it('is due an interval after its newest good sweep', async () => {
    const headers = { 'if-match': '*' };
    const payload = { test_interval_days: 10 };
    await club.call({ method: 'PATCH', url: '/v1/antennas/field-20m', headers, payload });
    expect((await antenna()).due_at).toBe('2026-03-12T13:00:00.000Z');
  });

  it('is unusable where no part is within the limit', async () => {
    const file = resonatorFile({ ...whole, resistanceOhm: 300, comment: 'high' });
    await upload(club, file, measuredOn('2026-03-03'));
    expect((await antenna()).state).toBe('unusable');
  });

  it('is partly tested where the sweep covers a part', async () => {
    const file = resonatorFile({ lowHz: 14_150_000, highHz: 14_200_000, comment: 'short' });
    await upload(club, file, measuredOn('2026-03-04'));
    expect((await antenna()).state).toBe('partly_tested');
  });

  it('stands by the sweep before one of an open connector, which is the latest still', async () => {
    const before = await antenna();
    const rows = Array.from({ length: 51 }, (_, i) => `${13.9 + i * 0.011} 0.999 0.01`);
    const open = `# MHz S RI R 50\n${rows.join('\n')}\n`;
    const { id, summary } = (await upload(club, open, measuredOn('2026-03-05'))).json();
    expect(summary.quality.flags.map(({ code }: { code: string }) => code)).toContain(
      'looks_open_or_short',
    );
    const after = await antenna();
    expect(after.bands).toEqual(before.bands);
    expect(after.latest_sweep.id).toBe(id);
  });

  it('has a state for each of its design bands, and the first in need of a look as its own', async () => {
    const headers = { 'if-match': '*' };
    const payload = { design_bands: ['20m', '15m'] };
    await club.call({ method: 'PATCH', url: '/v1/antennas/field-20m', headers, payload });
    const standing = await antenna();
    expect(standing.bands.map(({ state }: { state: string }) => state)).toEqual([
      'partly_tested',
      'untested',
    ]);
    expect(standing.state).toBe('untested');
  });
});

describe('a dashboard that a client has', () => {
  it('is not sent again until something happens', async () => {
    const { headers } = await club.call({ url: '/v1/dashboard' });
    const asked = { url: '/v1/dashboard', headers: { 'if-none-match': String(headers.etag) } };
    expect((await club.call(asked)).statusCode).toBe(304);
    const file = resonatorFile({ comment: 'one more' });
    await upload(club, file, measuredOn('2026-03-06'));
    const next = await club.call(asked);
    expect(next.statusCode).toBe(200);
    expect(next.headers.etag).not.toBe(headers.etag);
  });
});

describe('the public dashboard', () => {
  const url = '/v1/public/test-club/dashboard';
  const anybody = () => club.call({ url, headers: { authorization: '' } });

  it('is not there before the club shows it, nor that of a club that is none', async () => {
    expect((await anybody()).statusCode).toBe(404);
    expect((await club.call({ url: '/v1/public/nobody/dashboard' })).statusCode).toBe(404);
  });

  it('shows antennas without a token, but no person, place, note or id', async () => {
    const site = { latitude_deg: 56.123, longitude_deg: 23.456, note: 'behind the barn' };
    const headers = { 'if-match': '*' };
    await club.call({ method: 'PATCH', url: '/v1/sites/field', headers, payload: site });
    const show = { public_dashboard: true };
    await club.call({ method: 'PATCH', url: '/v1/club', headers, payload: show });
    const answer = await anybody();
    expect(answer.statusCode).toBe(200);
    const [{ antennas }] = answer.json().sites;
    expect(antennas[0].bands[0]).toMatchObject({ band: '20m', measured_on: '2026-03-06' });
    expect(answer.body).not.toMatch(/56\.1|23\.4|barn|member|[0-9a-f]{8}-[0-9a-f]{4}-7/);
  });

  it('is gone when the club shows it no more', async () => {
    const payload = { public_dashboard: false };
    await club.call({ method: 'PATCH', url: '/v1/club', headers: { 'if-match': '*' }, payload });
    expect((await anybody()).statusCode).toBe(404);
  });
});
