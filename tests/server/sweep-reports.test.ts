import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { reportBasisOf } from '../../server/report-basis.ts';
import { assumptionsOf, readSweepOf, summaryOf } from '../../server/reports.ts';
import { viewOf } from '../../server/sweep-view.ts';
import { addAntenna, resonatorFile, upload } from '../support/club-records.ts';
import { makeTestApp, type TestApp, testUrl } from '../support/test-app.ts';

let club: TestApp;
let id: string;

beforeAll(async () => {
  club = await makeTestApp();
  await addAntenna(club);
  id = (await upload(club, resonatorFile())).json().id;
});
afterAll(() => club.close());

const get = (path: string) => club.call({ url: `/v1/sweeps/${id}${path}` });

describe('a summary', () => {
  it('has the resonance and the least SWR of a resonator of 60 ohm', async () => {
    const { minimum_swr, resonances } = (await get('/summary')).json();
    // At zero reactance SWR is 60/50 (any handbook: SWR = R/Z0 for R > Z0).
    expect(minimum_swr.swr).toBeCloseTo(1.2, 6);
    expect(minimum_swr.frequency_hz / 14_175_000).toBeCloseTo(1, 6);
    expect(resonances).toHaveLength(1);
    expect(resonances[0]).toMatchObject({ kind: 'series' });
    expect(resonances[0].resistance_ohm).toBeCloseTo(60, 4);
  });

  it('against another reference has the SWR against that', async () => {
    const { minimum_swr, reference_ohm } = (await get('/summary?reference_ohm=75')).json();
    expect(reference_ohm).toBe(75);
    expect(minimum_swr.swr).toBeCloseTo(75 / 60, 6);
  });

  it('has another tag for another reference', async () => {
    const tags = await Promise.all(
      ['', '?reference_ohm=50', '?reference_ohm=75'].map(
        async (query) => (await get(`/summary${query}`)).headers.etag,
      ),
    );
    expect(tags[0]).toBe(tags[1]);
    expect(tags[0]).not.toBe(tags[2]);
  });

  it('is the stored text, and the same text when it has to be computed', async () => {
    const stored = await get('/summary');
    const record = await club.service.store.findSweep(club.actor.clubId, id);
    if (record === null) throw new Error('The record is gone.');
    const sweep = await readSweepOf(club.service, record);
    const basis = await reportBasisOf(club.service, record);
    const view = viewOf(basis, sweep, assumptionsOf(record));
    const computed = JSON.stringify(summaryOf(record, view, basis));
    expect(stored.body).toBe(computed);
  });

  it('cannot be given at the feed point while the feed line is not known', async () => {
    expect((await get('/summary?plane=measured')).statusCode).toBe(200);
    const answer = await get('/summary?plane=feed_point');
    expect(answer.statusCode).toBe(409);
    expect(answer.json()).toMatchObject({
      type: `${testUrl}/problems/plane-unavailable`,
      errors: [{ parameter: 'plane' }],
    });
  });

  it.each(['reference_ohm=0', 'reference_ohm=x', 'plane=moon', 'max_swr=2'])(
    'refuses %s',
    async (query) => {
      expect((await get(`/summary?${query}`)).statusCode).toBe(400);
    },
  );
});

describe('a usable-band report', () => {
  it('tells of the band that was swept whole', async () => {
    const report = (await get('/usable')).json();
    expect(report).toMatchObject({
      sweep_id: id,
      plan: 'iaru-r1',
      licence: null,
      max_swr: 2,
      design_bands: ['20m'],
    });
    const [band] = report.bands;
    expect(band).toMatchObject({ band: '20m', low_hz: 14_000_000, high_hz: 14_350_000 });
    expect(band.swept_fraction).toBe(1);
    // SWR 2 is where |X| = 37.19 ohm for R = 60 ohm at 50 ohm: (s + 1/s)/2 = (R^2+X^2+Z0^2)/(2 R Z0),
    // so the usable span is 14.175 MHz +- 92.97 kHz with 4e-4 ohm/Hz.
    const x = Math.sqrt(1.25 * 2 * 60 * 50 - 60 ** 2 - 50 ** 2);
    expect(band.spans).toHaveLength(1);
    expect(band.spans[0].low_hz).toBeCloseTo(14_175_000 - x / 4e-4, -2);
    expect(band.spans[0].high_hz).toBeCloseTo(14_175_000 + x / 4e-4, -2);
    expect(band.verdict).toBe('partly_usable');
  });

  it('follows the limit that is asked for', async () => {
    const [band] = (await get('/usable?max_swr=10')).json().bands;
    expect(band).toMatchObject({ verdict: 'usable', usable_fraction: 1 });
    const [strict] = (await get('/usable?max_swr=1.1')).json().bands;
    expect(strict).toMatchObject({ verdict: 'not_usable', usable_fraction: 0 });
  });

  it('follows the plan and the class that are asked for', async () => {
    const extra = (await get('/usable?plan=us-fcc')).json();
    expect(extra).toMatchObject({ plan: 'us-fcc', licence: null });
    const plans = (await club.call({ url: '/v1/plans' })).json();
    const fcc = plans.items.find((plan: { id: string }) => plan.id === 'us-fcc');
    const { licence } = fcc.segments.find((row: { licence?: string }) => row.licence);
    const query = `?plan=us-fcc&licence=${encodeURIComponent(licence)}`;
    expect((await get(`/usable${query}`)).json().licence).toBe(licence);
  });

  it.each([
    ['plan=nowhere', 'plan'],
    ['licence=nobody', 'licence'],
  ])('refuses %s', async (query, parameter) => {
    const answer = await get(`/usable?${query}`);
    expect(answer.statusCode).toBe(422);
    expect(answer.json().errors).toEqual([{ detail: expect.any(String), parameter }]);
  });

  it.each(['max_swr=1', 'max_swr=21', 'reference_ohm=50'])('refuses %s', async (query) => {
    expect((await get(`/usable?${query}`)).statusCode).toBe(400);
  });

  it('cannot be given at the feed point while the feed line is not known', async () => {
    expect((await get('/usable?plane=feed_point')).statusCode).toBe(409);
  });

  it('follows the antenna when its limit is edited', async () => {
    const before = await get('/usable');
    const edit = (max_swr: number) =>
      club.call({
        method: 'PATCH',
        url: '/v1/antennas/field-20m',
        payload: { max_swr },
        headers: { 'if-match': '*' },
      });
    await edit(3);
    const after = await get('/usable');
    expect(after.json().max_swr).toBe(3);
    expect(after.headers.etag).not.toBe(before.headers.etag);
    await edit(2);
    expect((await get('/usable')).body).toBe(before.body);
  });
});

describe("what is known of an analyzer's own error", () => {
  const stated = { directivity_db: 30, source_match_db: 30, tracking_db: 0.2 };

  async function summaryBy(club: TestApp, residual_errors: object | null) {
    const key = residual_errors === null ? 'unknown' : 'known';
    const payload = { key, name: 'An analyzer', residual_errors };
    const added = await club.call({ method: 'POST', url: '/v1/analyzers', payload });
    expect(added.statusCode).toBe(201);
    const file = resonatorFile({ comment: key });
    const { id, summary } = (await upload(club, file, `?analyzer=${key}`)).json();
    return { id, summary };
  }

  it('widens the half-widths of SWR and resistance, and is told beside them', async () => {
    const club = await makeTestApp();
    await addAntenna(club);
    const bare = (await summaryBy(club, null)).summary;
    const full = (await summaryBy(club, stated)).summary;
    expect(bare.residual_errors).toBeNull();
    expect(full.residual_errors).toEqual(stated);
    expect(full.minimum_swr.swr).toBe(bare.minimum_swr.swr);
    // Directivity of 30 dB alone: 0.0316 of the reflection, about 2 x 0.0316 / (1 - 0.09)² of SWR.
    expect(full.minimum_swr.swr_u95 - bare.minimum_swr.swr_u95).toBeGreaterThan(0.05);
    expect(full.resonances[0].resistance_u95_ohm).toBeGreaterThan(2);
    const codes = (summary: { cautions: { code: string }[] }) =>
      summary.cautions.map(({ code }) => code);
    expect(codes(bare)).toContain('noise_only');
    expect(codes(full)).not.toContain('noise_only');
    await club.close();
  });

  it('that is learnt later changes the summary and its tag', async () => {
    const club = await makeTestApp();
    await addAntenna(club);
    const { id } = await summaryBy(club, null);
    const before = await club.call({ url: `/v1/sweeps/${id}/summary` });
    const analyzer = await club.call({ url: '/v1/analyzers/unknown' });
    const edit = await club.call({
      method: 'PATCH',
      url: '/v1/analyzers/unknown',
      headers: { 'if-match': String(analyzer.headers['etag']) },
      payload: { residual_errors: stated },
    });
    expect(edit.json().residual_errors).toEqual(stated);
    const after = await club.call({ url: `/v1/sweeps/${id}/summary` });
    expect(after.headers['etag']).not.toBe(before.headers['etag']);
    expect(after.json().minimum_swr.swr_u95).toBeGreaterThan(before.json().minimum_swr.swr_u95);
    await club.close();
  });
});
