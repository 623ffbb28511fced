import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { makeTestApp, type TestApp, testUrl } from '../support/test-app.ts';

const reel = {
  key: 'reel-75',
  name: 'Reel of foam coax',
  characteristic_ohm: 75,
  velocity_factor: 0.82,
  // k1 sqrt(f) + k2 f with k1 = 0.6 and k2 = 0.004, f in MHz: the law itself, so nothing is left.
  points: [4, 25, 100, 400].map((mhz) => ({
    frequency_hz: mhz * 1e6,
    loss_db_per_100_m: 0.6 * Math.sqrt(mhz) + 0.004 * mhz,
  })),
  source: 'sheet of the reel',
};

let club: TestApp;
beforeAll(async () => {
  club = await makeTestApp();
});
afterAll(() => club.close());

const add = (payload: Record<string, unknown>) =>
  club.call({ method: 'POST', url: '/v1/cables', payload });

describe('the reference cables', () => {
  it('have a source and a note of verification at every figure', async () => {
    const { reference, items } = (await club.call({ url: '/v1/cables' })).json();
    expect(reference.length).toBeGreaterThanOrEqual(10);
    for (const cable of reference) {
      expect(cable).toMatchObject({ origin: 'reference', id: null, created_by: null });
      expect(cable.verified).not.toBe('');
      expect(cable.losses.length).toBeGreaterThanOrEqual(2);
      for (const { source } of cable.losses) expect(source).toMatch(/read in|memory/);
    }
    expect(items).toEqual([]);
  });

  it('are found by key and by alias', async () => {
    const byKey = (await club.call({ url: '/v1/cables/m17-74-rg213' })).json();
    const byAlias = (await club.call({ url: '/v1/cables/coax-50-pe-10mm' })).json();
    expect(byAlias).toEqual(byKey);
    // MIL-C-17/74 as a posted summary prints it: 50 +- 2 ohm.
    expect(byKey).toMatchObject({ characteristic_ohm: 50, characteristic_u95_ohm: 2 });
    expect((await club.call({ url: '/v1/cables/wet-string' })).statusCode).toBe(404);
  });
});

describe("a club's own cable", () => {
  it('is fitted by the law of cables, with what the fit leaves', async () => {
    const added = await add(reel);
    expect(added.statusCode).toBe(201);
    const cable = added.json();
    expect(added.headers.location).toBe(`${testUrl}/v1/cables/${cable.id}`);
    expect(cable.attenuation.conductor_db_per_100_m).toBeCloseTo(0.6, 9);
    expect(cable.attenuation.dielectric_db_per_100_m).toBeCloseTo(0.004, 9);
    expect(cable.attenuation.residual_largest).toBeLessThan(1e-9);
    expect(cable.losses[1].fitted_db_per_100_m).toBeCloseTo(3.1, 9);
    expect(cable).toMatchObject({ origin: 'club', loss_u95_fraction: 0.15, invented: false });
    expect((await club.call({ url: '/v1/cables/reel-75' })).json()).toEqual(cable);
    expect((await club.call({ url: `/v1/cables/${cable.id}` })).json()).toEqual(cable);
    expect((await club.call({ url: '/v1/cables' })).json().items).toEqual([cable]);
  });

  it('shows how far rough figures are off the law', async () => {
    const points = reel.points.map((point, i) => ({
      ...point,
      loss_db_per_100_m: point.loss_db_per_100_m * (i % 2 === 0 ? 1.06 : 0.94),
    }));
    const { attenuation } = (await add({ ...reel, key: 'rough', points })).json();
    expect(attenuation.residual_rms).toBeGreaterThan(0.03);
    expect(attenuation.residual_largest).toBeGreaterThanOrEqual(attenuation.residual_rms);
  });

  it('cannot take the key of another, nor the name of a reference cable', async () => {
    for (const key of ['reel-75', 'm17-74-rg213', 'coax-50-pe-10mm']) {
      const answer = await add({ ...reel, key });
      expect(answer.statusCode, key).toBe(409);
      expect(answer.json().type).toBe(`${testUrl}/problems/key-in-use`);
    }
  });

  const [first, second] = reel.points;
  it.each([
    ['cable_impedance_out_of_range', { characteristic_ohm: 0.5 }, '#/characteristic_ohm'],
    ['cable_velocity_factor_out_of_range', { velocity_factor: 66 }, '#/velocity_factor'],
    ['cable_half_width_negative', { velocity_factor_u95: -0.1 }, '#'],
    ['cable_points_too_few', { points: [first] }, '#/points'],
    [
      'cable_point_not_positive',
      { points: [first, { ...second, loss_db_per_100_m: -3 }] },
      '#/points/1',
    ],
    [
      'cable_loss_not_rising',
      { points: [first, { ...second, loss_db_per_100_m: 0.5 }] },
      '#/points/1',
    ],
    [
      'cable_fit_poor',
      { points: [first, second, { frequency_hz: 1e8, loss_db_per_100_m: 60 }] },
      '#/points',
    ],
  ])('that is nonsense is refused: %s', async (code, nonsense, pointer) => {
    const answer = await add({ ...reel, key: 'nonsense', ...nonsense });
    expect(answer.statusCode).toBe(422);
    expect(answer.json()).toMatchObject({
      type: `${testUrl}/problems/implausible-cable`,
      code,
      errors: [{ pointer }],
    });
    expect((await club.call({ url: '/v1/cables/nonsense' })).statusCode).toBe(404);
  });

  it('with an unknown field, or none of the needed ones, is refused as a fault of form', async () => {
    expect((await add({ ...reel, key: 'a', colour: 'black' })).statusCode).toBe(400);
    expect((await add({ key: 'a' })).statusCode).toBe(400);
  });

  it('pages by key', async () => {
    const first = (await club.call({ url: '/v1/cables?limit=1' })).json();
    expect(first.items.map(({ key }: { key: string }) => key)).toEqual(['reel-75']);
    const url = `/v1/cables?limit=1&cursor=${encodeURIComponent(first.page.next)}`;
    const second = (await club.call({ url })).json();
    expect(second.items.map(({ key }: { key: string }) => key)).toEqual(['rough']);
    expect(second.page.next).toBeNull();
  });

  it('serves in a feed line by its key, as soon as it is there', async () => {
    const { call } = club;
    await call({ method: 'POST', url: '/v1/sites', payload: { key: 'field', name: 'Field' } });
    const section = { length_m: 20, length_u95_m: 0.1, extra_loss_db: 0, choke: false };
    const payload = {
      key: 'mast',
      site: 'field',
      name: 'Mast',
      kind: 'dipole',
      plan: 'iaru-r1',
      feed_line: [{ ...section, cable: 'own-later' }],
    };
    await call({ method: 'POST', url: '/v1/antennas', payload });
    const { id } = (
      await call({
        method: 'POST',
        url: '/v1/antennas/mast/sweeps',
        payload: '# MHz S RI R 50\n14 0.3 0.1\n14.1 0.2 0.2\n14.2 0.1 0.3\n',
        headers: { 'content-type': 'application/octet-stream' },
      })
    ).json();
    const url = `/v1/sweeps/${id}/summary`;
    const before = await call({ url });
    expect(before.json().line).toMatchObject({ cables: [null], ends: [] });
    await add({ ...reel, key: 'own-later' });
    const after = await call({ url, headers: { 'if-none-match': before.headers.etag } });
    expect(after.statusCode).toBe(200);
    expect(after.json().line.cables).toEqual(['own-later']);
    // 20 m of 0.6 sqrt(14) + 0.004 * 14 dB per 100 m, to the tenth of a dB between 14 and 14.2 MHz.
    expect(after.json().line.ends[0].matched_loss_db).toBeCloseTo(0.46, 2);
  });
});
