import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { addAntenna, resonatorFile, upload } from '../support/club-records.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

let club: TestApp;
const ids: string[] = [];

/** An even reading off by some parts in ten thousand from point to point, so that it has a noise. */
async function sweepOn(day: string, resonanceHz: number, query = ''): Promise<string> {
  const file = resonatorFile({ resonanceHz, comment: day }).replace(
    /^(\d+) (\S+) (\S+)$/gm,
    (_, hz, re, im) =>
      `${hz} ${(Number(re) + (Number(hz) % 7) * 1e-4).toFixed(6)} ${(Number(im) - (Number(hz) % 11) * 1e-4).toFixed(6)}`,
  );
  const answer = await upload(club, file, `?measured_at=${day}T10:00:00Z${query}`);
  expect(answer.statusCode).toBe(201);
  return answer.json().id;
}
const compare = (first: string, second: string) =>
  club.call({ url: `/v1/sweeps/${first}/compare/${second}` });

beforeAll(async () => {
  club = await makeTestApp();
  await addAntenna(club, { feed_line: [] });
  ids.push(await sweepOn('2026-01-10', 14_100_000, '&weather=dry'));
  await club.call({
    method: 'POST',
    url: '/v1/antennas/field-20m/work',
    payload: { kind: 'trimmed', done_at: '2026-02-01T10:00:00Z', length_mm: 50 },
  });
  ids.push(await sweepOn('2026-02-10', 14_170_000, '&weather=dry'));
  ids.push(await sweepOn('2026-03-10', 14_100_000, '&weather=rain'));
  ids.push(await sweepOn('2026-04-10', 14_100_000, '&plane=feed_point'));
});
afterAll(() => club.close());

describe('two sweeps of an antenna', () => {
  it('are compared measure by measure, with what may differ beside the antenna', async () => {
    const answer = await compare(ids[0], ids[1]);
    expect(answer.statusCode).toBe(200);
    const { comparable, verdict, bands, cautions, curve } = answer.json();
    expect([comparable, verdict]).toEqual([true, 'changed']);
    const [{ frequency_hz }] = bands[0].resonances;
    expect(frequency_hz.verdict).toBe('changed');
    expect(frequency_hz.difference).toBeCloseTo(70_000, -3);
    expect(cautions.map(({ code }: { code: string }) => code)).toContain('work_between');
    expect(curve.largest).toBeGreaterThan(0.1);
  });

  it('have the length that explains the difference, from what trimming did before', async () => {
    const { length_change: change } = (await compare(ids[1], ids[2])).json();
    expect(change.method).toBe('own_sensitivity');
    // The trim of -50 mm moved it by +70 kHz; it is back where it was.
    expect(change.length_change_m).toBeCloseTo(0.05, 3);
  });

  it('are the same within uncertainty where they are', async () => {
    const { verdict, length_change: change } = (await compare(ids[0], ids[0])).json();
    expect([verdict, change]).toEqual(['same_within_uncertainty', null]);
  });

  it('are not compared across planes', async () => {
    const { comparable, obstacles, bands } = (await compare(ids[0], ids[3])).json();
    expect(comparable).toBe(false);
    expect(obstacles.map(({ code }: { code: string }) => code)).toEqual(['planes_differ']);
    expect(bands).toEqual([]);
  });

  it('must both be there', async () => {
    const unknown = '01970000-0000-7000-8000-000000000099';
    expect((await compare(ids[0], unknown)).statusCode).toBe(404);
  });
});

describe('advice on a sweep', () => {
  it('knows what earlier trimming of this antenna did', async () => {
    const answer = await club.call({ url: `/v1/sweeps/${ids[1]}/advice?target_hz=14250000` });
    expect(answer.statusCode).toBe(200);
    expect(answer.json().trim.method).toBe('own_sensitivity');
  });
});
