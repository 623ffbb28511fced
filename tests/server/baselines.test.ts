import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { addAntenna, resonatorFile, upload } from '../support/club-records.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

const url = '/v1/antennas/field-20m/baselines';
const ids: string[] = [];
let club: TestApp;

beforeAll(async () => {
  club = await makeTestApp();
  await addAntenna(club);
  await addAntenna(club, { key: 'bare' });
  const told = [
    ['2026-01-10', 14_050_000, 'rain'],
    ['2026-01-20', 14_100_000, 'dry'],
    ['2026-02-20', 14_120_000, 'dry'],
    ['2026-03-10', 14_200_000, 'snow_or_ice'],
  ] as const;
  for (const [day, resonanceHz, weather] of told) {
    const file = resonatorFile({ resonanceHz, comment: day });
    const answer = await upload(club, file, `?measured_at=${day}T10:00:00Z&weather=${weather}`);
    ids.push(answer.json().id);
  }
  const payload = { kind: 'trimmed', done_at: '2026-03-01T10:00:00Z' };
  await club.call({ method: 'POST', url: '/v1/antennas/field-20m/work', payload });
});
afterAll(() => club.close());

const eras = async (at = url) => (await club.call({ url: at })).json().items;
const choose = (payload: Readonly<Record<string, unknown>>) =>
  club.call({ method: 'POST', url, payload });

describe('the baselines of an antenna', () => {
  it('are one for each era, of dry sweeps where there are any', async () => {
    const [first, second] = await eras();
    expect(first).toMatchObject({ era: 0, began_at: null, work_id: null });
    expect(second).toMatchObject({ era: 1, began_at: '2026-03-01T10:00:00.000Z' });
    expect(first.bands[0]).toMatchObject({ source: 'dry', sweep_ids: [ids[1], ids[2]] });
    expect(first.bands[0].resonances[0].frequency_hz.value).toBeCloseTo(14_110_000, -2);
    expect(second.bands[0]).toMatchObject({ source: 'any', sweep_ids: [ids[3]] });
  });

  it('have no bands where nothing was swept', async () => {
    const [first, ...more] = await eras('/v1/antennas/bare/baselines');
    expect([first.bands, more]).toEqual([[], []]);
  });
});

describe('a chosen baseline', () => {
  it('holds for its era until none is chosen any more', async () => {
    const answer = await choose({ era: 0, sweeps: [ids[0]] });
    expect(answer.statusCode).toBe(200);
    const [chosen] = answer.json().items;
    expect(chosen.bands[0]).toMatchObject({ source: 'chosen', sweep_ids: [ids[0]] });
    expect((await eras())[0]).toEqual(chosen);
    const back = await choose({ era: 0, sweeps: [] });
    expect(back.json().items[0].bands[0].source).toBe('dry');
  });

  it('is of sweeps of that era and antenna', async () => {
    const unknown = '01970000-0000-7000-8000-000000000099';
    for (const [payload, pointer] of [
      [{ era: 0, sweeps: [ids[0], ids[3]] }, '#/sweeps/1'],
      [{ era: 0, sweeps: [unknown] }, '#/sweeps/0'],
      [{ era: 5, sweeps: [] }, '#/era'],
    ] as const) {
      const answer = await choose(payload);
      expect(answer.statusCode).toBe(422);
      expect(answer.json().errors[0].pointer).toBe(pointer);
    }
  });
});
