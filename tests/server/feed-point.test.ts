import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { findCable } from '../../core/line/cables.ts';
import { type FeedLine, resolveFeedLine } from '../../core/line/feed-line.ts';
import { addAntenna, resonatorFile, upload } from '../support/club-records.ts';
import { makeTestApp, type TestApp, testUrl } from '../support/test-app.ts';
import { throughLineFile } from '../support/through-line.ts';

const section = {
  cable: 'm17-74-rg213',
  length_m: 23.3,
  length_u95_m: 0.05,
  extra_loss_db: 0.2,
  choke: false,
};

function lineOf(lengthM: number, cable = section.cable, extraLossDb = 0.2): FeedLine {
  const stated = { cable, lengthM, lengthU95M: 0.05, extraLossDb, choke: false };
  const line = resolveFeedLine([stated], findCable);
  if (!line.ok) throw new Error(line.error.detail);
  return line.value;
}

/** At the feed point resonant at 14.175 MHz with 150 ohm: SWR 3 (R/Z0). */
const atAntenna = resonatorFile({ resistanceOhm: 150 });

let club: TestApp;
let id: string;

beforeAll(async () => {
  club = await makeTestApp();
  await addAntenna(club, { feed_line: [section] });
  id = (await upload(club, throughLineFile(atAntenna, lineOf(23.3)))).json().id;
});
afterAll(() => club.close());

const get = (path: string, headers = {}) => club.call({ url: `/v1/sweeps/${id}${path}`, headers });

async function setFeedLine(feed_line: unknown) {
  const answer = await club.call({
    method: 'PATCH',
    url: '/v1/antennas/field-20m',
    headers: { 'if-match': '*' },
    payload: { feed_line },
  });
  expect(answer.statusCode).toBe(200);
}

describe('a summary through a known line', () => {
  it('shows the SWR at both ends and what is lost between', async () => {
    const { line, plane } = (await get('/summary')).json();
    expect(plane).toBe('measured');
    expect(line.feed_line).toEqual([section]);
    expect(line.cables).toEqual(['m17-74-rg213']);
    expect(line.ends.length).toBeGreaterThanOrEqual(1);
    for (const end of line.ends) {
      expect(end.swr_antenna).toBeGreaterThan(end.swr_shack);
      expect(end.total_loss_db).toBeCloseTo(end.matched_loss_db + end.mismatch_loss_db, 9);
      expect(end.method).toBe('complex');
    }
    // Nominal 0.75 dB per 100 ft near 14 MHz (between 0.6 at 10 and 1.08 at 30 MHz, the list's own
    // sources), 23.3 m, and 0.2 dB of connectors.
    expect(line.ends[0].matched_loss_db).toBeGreaterThan(0.65);
    expect(line.ends[0].matched_loss_db).toBeLessThan(0.85);
  });

  it('says that a resonance at the shack is not that of the antenna', async () => {
    const { line } = (await get('/summary')).json();
    const flag = line.flags.find(({ code }: { code: string }) => code === 'line_moves_resonance');
    expect(flag.detail).toMatch(/not that of the antenna/);
  });

  it('is the stored text until the line is edited, and back to it', async () => {
    const first = await get('/summary');
    await setFeedLine([{ ...section, length_m: 30 }]);
    const edited = await get('/summary', { 'if-none-match': first.headers.etag });
    expect(edited.statusCode).toBe(200);
    expect(edited.headers.etag).not.toBe(first.headers.etag);
    expect(edited.json().line.feed_line[0].length_m).toBe(30);
    expect(edited.json().line.ends[0].matched_loss_db).toBeGreaterThan(
      first.json().line.ends[0].matched_loss_db,
    );
    await setFeedLine([section]);
    const back = await get('/summary', { 'if-none-match': first.headers.etag });
    expect(back.statusCode).toBe(304);
    expect((await get('/summary')).body).toBe(first.body);
  });

  it('flags a mismatch that the loss hides', async () => {
    const lossy = [{ ...section, cable: 'm17-28-rg58', length_m: 40, extra_loss_db: 2 }];
    await setFeedLine(lossy);
    const seen = throughLineFile(atAntenna, lineOf(40, 'm17-28-rg58', 2));
    const { line, minimum_swr } = (await upload(club, seen)).json().summary;
    expect(minimum_swr.swr).toBeLessThan(2);
    expect(line.flags.map(({ code }: { code: string }) => code)).toContain('loss_hides_mismatch');
    await setFeedLine([section]);
  });

  it('says why nothing is known beyond an unknown line', async () => {
    await setFeedLine([{ ...section, length_m: null }]);
    const { line } = (await get('/summary')).json();
    expect(line.ends).toEqual([]);
    const codes = line.flags.map(({ code }: { code: string }) => code);
    expect(codes).toEqual(['line_length_unknown', 'line_moves_resonance']);
    await setFeedLine([section]);
  });
});

describe('a summary at the feed point', () => {
  it('has the resonance and resistance of the antenna, within half-widths grown by the line', async () => {
    const measured = (await get('/summary')).json();
    const { resonances, minimum_swr, plane, line } = (
      await get('/summary?plane=feed_point')
    ).json();
    expect(plane).toBe('feed_point');
    expect(resonances).toHaveLength(1);
    expect(resonances[0].frequency_hz / 14_175_000).toBeCloseTo(1, 6);
    expect(resonances[0].resistance_ohm).toBeCloseTo(150, 2);
    expect(minimum_swr.swr).toBeCloseTo(3, 4);
    expect(minimum_swr.swr_u95).toBeGreaterThan(10 * measured.minimum_swr.swr_u95);
    expect(resonances[0].frequency_u95_hz).toBeGreaterThan(1000);
    expect(line.conditioning.swr).toBe('good');
    expect(line.flags.map(({ code }: { code: string }) => code)).not.toContain(
      'line_moves_resonance',
    );
  });

  it('is told as worthless where the line hides the antenna', async () => {
    await setFeedLine([{ ...section, cable: 'm17-28-rg58', length_m: 60, length_u95_m: 1 }]);
    const { line, cautions } = (await get('/summary?plane=feed_point')).json();
    expect(line.conditioning.impedance).toBe('worthless');
    const reasons = line.conditioning.reasons.map(({ code }: { code: string }) => code);
    expect(reasons.length).toBeGreaterThanOrEqual(1);
    expect(cautions.map(({ code }: { code: string }) => code)).toEqual(
      expect.arrayContaining(reasons),
    );
    await setFeedLine([section]);
  });

  it('has a tag of its own, which follows the line', async () => {
    const first = await get('/summary?plane=feed_point');
    const again = await get('/summary?plane=feed_point', { 'if-none-match': first.headers.etag });
    expect(again.statusCode).toBe(304);
    expect(first.headers.etag).not.toBe((await get('/summary')).headers.etag);
    await setFeedLine([{ ...section, extra_loss_db: 0.3 }]);
    expect((await get('/summary?plane=feed_point')).headers.etag).not.toBe(first.headers.etag);
    await setFeedLine([section]);
  });

  it('against another reference is against that', async () => {
    const path = '/summary?plane=feed_point&reference_ohm=75';
    const { minimum_swr, reference_ohm } = (await get(path)).json();
    expect(reference_ohm).toBe(75);
    // 150 ohm against 75 (any handbook: SWR = R/Z0).
    expect(minimum_swr.swr).toBeCloseTo(2, 4);
  });

  it.each([
    [null, 'line_unknown'],
    [[{ ...section, length_m: null }], 'line_length_unknown'],
    [[{ ...section, cable: 'wet string' }], 'cable_unknown'],
    [[{ ...section, cable: 'm17-28-rg58', length_m: 1500 }], 'line_loss_too_great'],
  ])('cannot be given with the line %j: %s', async (feedLine, code) => {
    await setFeedLine(feedLine);
    for (const path of ['/summary', '/usable', '/points', '/advice']) {
      const answer = await get(`${path}?plane=feed_point`);
      expect(answer.statusCode, path).toBe(409);
      expect(answer.json()).toMatchObject({ type: `${testUrl}/problems/plane-unavailable`, code });
    }
    await setFeedLine([section]);
  });

  it('is that of the shack where the analyzer sits at the feed point, even without phase', async () => {
    await setFeedLine([]);
    const swrTable = 'frequency,swr\n14000000,1.5\n14100000,1.2\n14200000,1.3\n14300000,1.9\n';
    const added = await upload(club, swrTable, '?columns=frequency:Hz,swr');
    expect(added.statusCode).toBe(201);
    const url = `/v1/sweeps/${added.json().id}/summary`;
    const here = (await club.call({ url })).json();
    const there = (await club.call({ url: `${url}?plane=feed_point` })).json();
    expect(there.plane).toBe('feed_point');
    expect(there.minimum_swr).toEqual(here.minimum_swr);
    await setFeedLine([section]);
    const refused = await club.call({ url: `${url}?plane=feed_point` });
    expect(refused.json()).toMatchObject({ status: 409, code: 'phase_needed' });
  });

  it('of a sweep taken there is its own, and none is to be had at the shack', async () => {
    const added = await upload(club, `! at the antenna\n${atAntenna}`, '?plane=feed_point');
    const { id: own, summary } = added.json();
    expect(summary.line).toBeNull();
    const url = `/v1/sweeps/${own}/summary`;
    expect((await club.call({ url: `${url}?plane=feed_point` })).json()).toEqual(summary);
    expect((await club.call({ url: `${url}?plane=measured` })).statusCode).toBe(409);
  });
});

describe('a usable-band report at the feed point', () => {
  it('judges the SWR of the antenna, not that of the shack', async () => {
    const shack = (await get('/usable?max_swr=2.8')).json();
    const antenna = (await get('/usable?max_swr=2.8&plane=feed_point')).json();
    expect(antenna.plane).toBe('feed_point');
    const band = (report: typeof shack) =>
      report.bands.find(({ band }: { band: string }) => band === '20m');
    expect(band(shack).usable_fraction).toBeGreaterThan(0.1);
    expect(band(antenna)).toMatchObject({ verdict: 'not_usable', usable_fraction: 0 });
    expect(band(antenna).minimum_swr).toBeCloseTo(3, 3);
    expect(band(antenna).worst_swr_u95).toBeGreaterThan(band(shack).worst_swr_u95);
  });

  it('follows the limit that is asked, with edges where the antenna’s SWR crosses it', async () => {
    const { bands } = (await get('/usable?max_swr=3.5&plane=feed_point')).json();
    const [band] = bands.filter(({ band }: { band: string }) => band === '20m');
    expect(band.spans).toHaveLength(1);
    expect(band.spans[0].low_hz).toBeLessThan(14_175_000);
    expect(band.spans[0].high_hz).toBeGreaterThan(14_175_000);
  });

  it('has a tag that follows the line, which that at the shack does not', async () => {
    const tags = async () => [
      (await get('/usable')).headers.etag,
      (await get('/usable?plane=feed_point')).headers.etag,
    ];
    const before = await tags();
    await setFeedLine([{ ...section, extra_loss_db: 0.3 }]);
    const after = await tags();
    expect(after[0]).toBe(before[0]);
    expect(after[1]).not.toBe(before[1]);
    await setFeedLine([section]);
  });
});

describe('points at the feed point', () => {
  it('are those of the antenna again, to 1e-10, and say that they were moved', async () => {
    const { note, reflection_re, frequency_hz } = (await get('/points?plane=feed_point')).json();
    expect(note).toMatch(/not a measurement/);
    // (R + jX - 50)/(R + jX + 50), X = 4e-4 (f - f0).
    for (const [i, hz] of frequency_hz.entries()) {
      const x = 4e-4 * (hz - 14_175_000);
      const re = (100 * 200 + x * x) / (200 ** 2 + x * x);
      expect(Math.abs(reflection_re[i] - re)).toBeLessThan(1e-10);
    }
    expect(frequency_hz.length).toBe(111);
  });

  it('come as CSV and Touchstone too, under another tag than the measured ones', async () => {
    for (const form of ['csv', 'touchstone']) {
      const moved = await get(`/points?plane=feed_point&as=${form}`);
      const measured = await get(`/points?as=${form}`);
      expect(moved.statusCode).toBe(200);
      expect(moved.body).not.toBe(measured.body);
      expect(moved.headers.etag).not.toBe(measured.headers.etag);
    }
  });
});
