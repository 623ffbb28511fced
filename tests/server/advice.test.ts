import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { addAntenna, resonatorFile, upload } from '../support/club-records.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

let club: TestApp;
/** A dipole that resonates at 13.9 MHz with 30 ohm, swept at its feed point. */
let low: string;
/** The same dipole with its reactance unsigned. */
let unsigned: string;

beforeAll(async () => {
  club = await makeTestApp();
  await addAntenna(club, { feed_line: [] });
  const file = resonatorFile({
    resonanceHz: 13_900_000,
    resistanceOhm: 30,
    lowHz: 13_500_000,
    highHz: 14_500_000,
    points: 401,
  });
  low = (await upload(club, file)).json().id;
  const rows = Array.from({ length: 101 }, (_, i) => {
    const hz = 13_900_000 + 5_000 * i;
    return `${hz},60,${Math.abs(4e-4 * (hz - 14_175_000))}`;
  });
  const told = await upload(
    club,
    `${rows.join('\n')}\n`,
    '?columns=frequency:Hz,resistance,reactance_magnitude',
  );
  unsigned = told.json().id;
});
afterAll(() => club.close());

const advice = async (query = '', sweep = low) => {
  const answer = await club.call({ url: `/v1/sweeps/${sweep}/advice${query}` });
  expect(answer.statusCode, answer.body).toBe(200);
  return answer.json();
};

describe('advice on a dipole that resonates below its band', () => {
  it('is for the first design band, and says that its middle is the target', async () => {
    expect(await advice()).toMatchObject({
      range: { name: '20m', low_hz: 14_000_000, high_hz: 14_350_000 },
      target_hz: 14_175_000,
      target_from: 'middle',
    });
  });

  it('says by how far to shorten it: 1 - 13.9/14.175 of its length', async () => {
    // Frequency goes with 1/length for a bare wire (any handbook); of 10 m that is 19.4 cm.
    const { trim } = await advice('?length_m=10');
    expect(trim).toMatchObject({ method: 'simple_rule', direction: 'shorten', goal: 'resonance' });
    expect(trim.length_change_m).toBeCloseTo(10 * (13.9 / 14.175 - 1), 6);
    expect(trim.length_change_fraction).toBeCloseTo(13.9 / 14.175 - 1, 8);
  });

  it('can move the least SWR instead, and to another frequency', async () => {
    const { trim, target_from } = await advice('?goal=swr_minimum&target_hz=14050000');
    expect(target_from).toBe('asked');
    expect(trim.goal).toBe('swr_minimum');
    expect(trim.frequency_change_hz).toBeCloseTo(14_050_000 - 13_900_000, -2);
  });

  it('finds in plain words that it is too long', async () => {
    const { findings } = await advice();
    expect(findings).toContainEqual(
      expect.objectContaining({
        band: '20m',
        next: 'trim',
        detail: expect.stringMatching(/below/),
      }),
    );
  });

  it('has an aim of its own where one is asked', async () => {
    const { range, target_hz } = await advice('?low_hz=14000000&high_hz=14070000');
    expect(range).toMatchObject({ low_hz: 14_000_000, high_hz: 14_070_000 });
    expect(target_hz).toBe(14_035_000);
  });
});

describe('the matches that are advised', () => {
  it('stand with the widest usable span first', async () => {
    const { match } = await advice('?max_swr=3');
    const widths = match.options.map((one: { nearest: { usable_width_hz: number } }) =>
      Number(one.nearest.usable_width_hz),
    );
    expect(widths.length).toBeGreaterThan(4);
    expect(widths).toEqual(widths.toSorted((a: number, b: number) => b - a));
  });

  it('are of several kinds, at the feed point, with the SWR at every frequency listed', async () => {
    const { match } = await advice();
    const kinds = new Set(match.options.map(({ kind }: { kind: string }) => kind));
    expect(kinds.size).toBeGreaterThan(3);
    expect(match.place).toBe('feed_point');
    expect(match.frequency_hz.length).toBeLessThanOrEqual(61);
    expect(match.frequency_hz.at(0)).toBe(14_000_000);
    expect(match.frequency_hz.at(-1)).toBe(14_350_000);
    for (const { nearest } of match.options) {
      expect(nearest.swr).toHaveLength(match.frequency_hz.length);
    }
  });

  it('lose more in coils of lower Q', async () => {
    const lossOf = async (query: string) => {
      const { match } = await advice(query);
      const network = match.options.find(({ kind }: { kind: string }) => kind === 'l_network');
      return network.exact.design_loss_db;
    };
    expect(await lossOf('?coil_q=50')).toBeGreaterThan(2 * (await lossOf('?coil_q=200')));
  });
});

describe('what power does', () => {
  it('is said only where a power is given', async () => {
    const answer = await advice();
    expect(answer).toMatchObject({ power: null, hot_spots: null });
    expect(answer.absent).toContainEqual(
      expect.objectContaining({ field: 'power', code: 'power_not_given' }),
    );
  });

  it('is sqrt(P/R) of current at the resonance', async () => {
    // Circuit theory: 100 W into 30 ohm is 1.826 A and 54.8 V.
    const { power } = await advice('?power_w=100&low_hz=13800000&high_hz=14000000');
    expect(power.frequency_hz).toBe(13_900_000);
    expect(power.feed_point.current_a).toBeCloseTo(Math.sqrt(100 / 30), 3);
    expect(power.feed_point.voltage_v).toBeCloseTo(Math.sqrt(100 * 30), 2);
  });

  it('names the hot places of a dipole, with the cautions beside them', async () => {
    const { hot_spots, cautions } = await advice('?power_w=100');
    expect(hot_spots.radiator).toBe('half_wave_dipole');
    expect(hot_spots.spots).toContainEqual(
      expect.objectContaining({ what: 'high_voltage', place: 'end' }),
    );
    const codes = cautions.map(({ code }: { code: string }) => code);
    expect(codes).toEqual(expect.arrayContaining(['power_burns', 'power_exposure_local']));
  });
});

describe('advice on a sweep without the sign of its reactance', () => {
  it('trims by the least SWR, and says why there is no match', async () => {
    const { trim, match, absent } = await advice('', unsigned);
    expect(trim.goal).toBe('swr_minimum');
    expect(match).toBeNull();
    expect(absent).toContainEqual(
      expect.objectContaining({ field: 'match', code: 'phase_needed' }),
    );
  });
});

describe('a request for advice', () => {
  it.each([
    'low_hz=1',
    'low_hz=5&high_hz=4',
    'band=20m&low_hz=1&high_hz=2',
    'power_w=0',
    'x=1',
    'coil_q=4e-323',
    'capacitor_q=3e-151',
    'low_hz=6e-323&high_hz=15e6',
  ])('refuses %s', async (query) => {
    const answer = await club.call({ url: `/v1/sweeps/${low}/advice?${query}` });
    expect(answer.statusCode).toBe(400);
  });

  it('is answered with 304 while nothing has changed', async () => {
    const url = `/v1/sweeps/${low}/advice`;
    const { headers } = await club.call({ url });
    const again = await club.call({ url, headers: { 'if-none-match': String(headers.etag) } });
    expect(again.statusCode).toBe(304);
  });
});
