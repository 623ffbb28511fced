import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { findCable } from '../../core/line/cables.ts';
import { type FeedLine, type FeedLineSection, resolveFeedLine } from '../../core/line/feed-line.ts';
import { addAntenna } from '../support/club-records.ts';
import { linearReader, markPlace } from '../support/read-chart.ts';
import { makeTestApp, type TestApp, testUrl } from '../support/test-app.ts';
import { lineEndFile } from '../support/through-line.ts';

const cable = 'm17-74-rg213';

function lineOf(...sections: readonly (readonly [name: string, lengthM: number])[]): FeedLine {
  const stated = sections.map(
    ([name, lengthM]): FeedLineSection => ({
      cable: name,
      lengthM,
      lengthU95M: 0.05,
      extraLossDb: 0,
      choke: false,
    }),
  );
  const line = resolveFeedLine(stated, findCable);
  if (!line.ok) throw new Error(line.error.detail);
  return line.value;
}

const codes = (items: readonly { readonly code: string }[]) => items.map(({ code }) => code);

let club: TestApp;
beforeAll(async () => {
  club = await makeTestApp();
  await addAntenna(club, {
    feed_line: [{ cable, length_m: 22, length_u95_m: 0.1, extra_loss_db: 0, choke: false }],
  });
  await addAntenna(club, { key: 'unlined' });
});
afterAll(() => club.close());

const listUrl = '/v1/antennas/field-20m/line-checks';
const send = (file: string, query: string, antenna = 'field-20m') =>
  club.call({
    method: 'POST',
    url: `/v1/antennas/${antenna}/line-checks?${query}`,
    payload: file,
    headers: { 'content-type': 'application/octet-stream' },
  });

const good = lineEndFile(lineOf([cable, 22]));
const told = `cable=${cable}&known_length_m=22&known_length_u95_m=0.1`;

describe('a check of a line with an open end', () => {
  it('finds its length within 0.2 % and its loss as the cable’s data say', async () => {
    const answer = await send(good, `far_end=open&${told}&measured_at=2026-01-10T10:00:00Z`);
    expect(answer.statusCode).toBe(201);
    const { report, trace, id, ...record } = answer.json();
    expect(answer.headers.location).toMatch(new RegExp(`/line-checks/${id}$`));
    expect(record).toMatchObject({
      far_end: 'open',
      cable,
      known_length_m: 22,
      points: 401,
      compared_with: null,
      changes: [],
    });
    // Issue's own bound for a noise-free line; the electrical length is that over 0.66.
    expect(Math.abs(report.length_m / 22 - 1)).toBeLessThan(0.002);
    expect(Math.abs(report.electrical_length_m / (22 / 0.66) - 1)).toBeLessThan(0.002);
    expect(report.measured_velocity_factor).toBeCloseTo(0.66, 3);
    expect(report.loss.ratio).toBeCloseTo(1, 2);
    expect(report.loss.frequency_hz.length).toBeLessThanOrEqual(101);
    expect(report.findings).toEqual([]);
    // c VF/(2 span) and c VF/(2 step) at 200 MHz and 500 kHz.
    expect(trace.resolution_m).toBeCloseTo((299_792_458 * 0.66) / 2 / 200e6, 6);
    expect(trace.alias_free_m).toBeCloseTo((299_792_458 * 0.66) / 2 / 500e3, 6);
    expect(trace.window.id).toBe('kaiser_6');
  });

  it('shows the end as the highest place of a short trace', async () => {
    const { items } = (await club.call({ url: listUrl })).json();
    const { trace } = (await club.call({ url: `${listUrl}/${items[0].id}` })).json();
    expect(trace.magnitude.length).toBeLessThanOrEqual(1000);
    const highest = trace.magnitude.indexOf(Math.max(...trace.magnitude)) * trace.step_m;
    expect(Math.abs(highest - 22)).toBeLessThan(trace.resolution_m);
    expect(trace.magnitude.length * trace.step_m).toBeGreaterThan(30);
  });

  it('is drawn with its end at the length that it tells, and not sent again', async () => {
    const { items } = (await club.call({ url: listUrl })).json();
    const oldest = items[items.length - 1];
    const url = `${listUrl}/${oldest.id}/chart.svg?width=800`;
    const chart = await club.call({ url });
    expect(chart.headers['content-type']).toBe('image/svg+xml');
    const metres = linearReader(chart.body, 'axis-x');
    const end = metres(markPlace(chart.body, 'place end').x);
    expect(Math.abs(end - oldest.report.length_m)).toBeLessThan(0.1);
    expect(chart.headers['link']).toContain(`/line-checks/${oldest.id}>; rel="alternate"`);
    const again = { 'if-none-match': String(chart.headers.etag) };
    expect((await club.call({ url, headers: again })).statusCode).toBe(304);
    const elsewhere = url.replace('field-20m', 'unlined');
    expect((await club.call({ url: elsewhere })).statusCode).toBe(404);
  });

  it('of the same bytes told alike is answered with the first record', async () => {
    const again = await send(good, `far_end=open&${told}`);
    expect(again.statusCode).toBe(200);
    expect(again.json().measured_at).toBe('2026-01-10T10:00:00.000Z');
  });

  it('told otherwise is a record of its own, not compared with itself', async () => {
    const corrected = await send(good, `far_end=shorted&${told}&measured_at=2026-01-10T10:00:00Z`);
    expect(corrected.statusCode).toBe(201);
    expect(corrected.json()).toMatchObject({ far_end: 'shorted', compared_with: null });
  });

  it('takes cable and length from the antenna’s record where nothing is told, and says so', async () => {
    const { report, ...record } = (
      await send(good, 'far_end=open&window=hann&measured_at=2026-01-10T10:00:00Z')
    ).json();
    expect(record).toMatchObject({ cable, known_length_m: 22, known_length_u95_m: 0.1 });
    expect(codes(report.assumptions)).toContain('line_from_record');
  });

  it('with a velocity factor alone has no loss to expect', async () => {
    const { report, cable: named } = (
      await send(good, 'far_end=open&velocity_factor=0.66&measured_at=2026-01-10T10:00:00Z')
    ).json();
    expect(named).toBeNull();
    expect(report.loss.expected_loss_db).toBeNull();
    expect(report.measured_velocity_factor).toBeNull();
    expect(codes(report.absent)).toContain('line_length_unknown');
  });
});

describe('a later check of the same line', () => {
  it('that lost more tells so, against the one before', async () => {
    const worse = lineEndFile(lineOf([cable, 11], ['m17-28-rg58', 11]), { comment: 'worse' });
    const answer = await send(worse, `far_end=open&${told}&measured_at=2026-03-01T10:00:00Z`);
    const { changes, compared_with, report } = answer.json();
    expect(compared_with).not.toBeNull();
    expect(codes(changes)).toContain('line_gained_loss');
    expect(codes(report.findings)).toContain('line_loss_above_cable');
  });

  it('that was cut short tells where, and is the finding of the list too', async () => {
    const cut = lineEndFile(lineOf([cable, 14]), { comment: 'cut' });
    const answer = await send(cut, `far_end=open&${told}&measured_at=2026-04-01T10:00:00Z`);
    const { report, changes } = answer.json();
    expect(Math.abs(report.length_m - 14)).toBeLessThan(0.03);
    expect(codes(report.findings)).toContain('line_shorter_than_stated');
    expect(codes(changes)).toContain('line_length_changed');
    const { items } = (await club.call({ url: listUrl })).json();
    expect(items[0]).toMatchObject({ id: answer.json().id, changes });
    expect(items[0].trace).toBeUndefined();
    expect(items.map(({ measured_at }: { measured_at: string }) => measured_at)).toEqual(
      items
        .map(({ measured_at }: { measured_at: string }) => measured_at)
        .toSorted()
        .reverse(),
    );
  });

  it('is compared across the pages of the list', async () => {
    const whole = (await club.call({ url: listUrl })).json().items;
    const seen: unknown[] = [];
    let cursor = '';
    do {
      const { items, page } = (await club.call({ url: `${listUrl}?limit=1${cursor}` })).json();
      seen.push(...items);
      cursor = page.next === null ? '' : `&cursor=${encodeURIComponent(page.next)}`;
    } while (cursor !== '');
    expect(seen).toEqual(whole);
    expect(seen.length).toBeGreaterThanOrEqual(5);
  });

  it('that joins another line part of the way has a fault there', async () => {
    const joined = lineEndFile(lineOf([cable, 8], ['coax-75-pe-6mm', 14]), { comment: 'joined' });
    const answer = await send(joined, `far_end=open&${told}&measured_at=2026-05-01T10:00:00Z`);
    const fault = answer
      .json()
      .report.discontinuities.find(({ kind }: { kind: string }) => kind === 'on_line');
    expect(Math.abs(fault.distance_m - 8)).toBeLessThan(answer.json().report.separable_m);
    expect(codes(answer.json().changes)).toContain('line_fault_new');
  });
});

describe('a check of a loaded end', () => {
  it('has no length where none is known, with the reason', async () => {
    const matched = lineEndFile(lineOf([cable, 22]), { end: 0.2, comment: 'loaded' });
    const query = `far_end=loaded&load_ohm=75&cable=${cable}`;
    const { report, load_ohm } = (await send(matched, query)).json();
    expect(load_ohm).toBe(75);
    expect(report.length_m).toBeNull();
    expect(codes(report.absent)).toEqual(expect.arrayContaining(['end_hidden', 'end_not_total']));
  });
});

describe('a line check is refused', () => {
  const few = '# MHz S RI R 50\n14 0.3 0.1\n14.1 0.2 0.2\n14.2 0.1 0.3\n';
  const narrow = lineEndFile(lineOf([cable, 22]), { lowHz: 14e6, highHz: 14.4e6 });
  const coarse = lineEndFile(lineOf([cable, 22]), { points: 21 });
  const matched = lineEndFile(lineOf([cable, 22]), { end: 0 });
  it.each([
    ['sweep_too_few_points', few],
    ['sweep_too_narrow', narrow],
    ['sweep_too_coarse', coarse],
    ['no_end_found', matched],
    ['sweep_steps_uneven', good.replace(/^2000000 .*\n/m, '')],
  ])('with the reason %s, and nothing is kept', async (code, file) => {
    const before = (await club.call({ url: listUrl })).json().items.length;
    const answer = await send(file, `far_end=open&${told}`);
    expect(answer.statusCode).toBe(422);
    expect(answer.json()).toMatchObject({
      type: `${testUrl}/problems/line-check-impossible`,
      code,
    });
    expect((await club.call({ url: listUrl })).json().items).toHaveLength(before);
  });

  it('without phase', async () => {
    const rows = Array.from({ length: 41 }, (_, i) => `${1e6 * (i + 1)},${3 + (i % 2)}`);
    const swrTable = `frequency,swr\n${rows.join('\n')}\n`;
    const answer = await send(swrTable, `far_end=open&${told}&columns=frequency:Hz,swr`);
    expect(answer.json()).toMatchObject({ status: 422, code: 'phase_needed' });
  });

  it('where neither the request nor the record says what the line is', async () => {
    const answer = await send(good, 'far_end=open', 'unlined');
    expect(answer.json()).toMatchObject({ status: 422, code: 'line_not_told' });
    expect((await send(good, `far_end=open&${told}`, 'unlined')).statusCode).toBe(201);
  });

  it('with a cable or analyzer that there is not, in the future, or as a broken file', async () => {
    for (const wrong of ['cable=wet-string', `${told}&analyzer=nobody`]) {
      const answer = await send(good, `far_end=open&${wrong}`);
      expect(answer.json().type, wrong).toBe(`${testUrl}/problems/unknown-reference`);
    }
    const future = await send(good, `far_end=open&${told}&measured_at=2030-01-01T00:00:00Z`);
    expect(future.json().type).toBe(`${testUrl}/problems/implausible-fact`);
    const broken = await send('# MHz S RI R 50\n1 x y\n', `far_end=open&${told}`);
    expect(broken.json().type).toBe(`${testUrl}/problems/unreadable-file`);
  });

  it('with a far end that is none, a load at an open end, or an unknown parameter', async () => {
    for (const wrong of ['far_end=burnt', 'far_end=open&load_ohm=50', 'far_end=open&colour=red']) {
      expect((await send(good, `${wrong}&${told}`)).statusCode, wrong).toBe(400);
    }
  });

  it('for an antenna or a check that there is not', async () => {
    expect((await send(good, `far_end=open&${told}`, 'nobody')).statusCode).toBe(404);
    expect((await club.call({ url: '/v1/antennas/nobody/line-checks' })).statusCode).toBe(404);
    const [{ id }] = (await club.call({ url: listUrl })).json().items;
    const elsewhere = `/v1/antennas/unlined/line-checks/${id}`;
    expect((await club.call({ url: elsewhere })).statusCode).toBe(404);
  });
});
