import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

const hertz = Array.from({ length: 41 }, (_, i) => 1e6 + i * 1e6);

/** A reading of a load by an analyzer with errors D + T Γ + M Γ², the phases turning with frequency. */
function readingOf(nominal: number, { d = 0, t = 0, m = 0 } = {}): string {
  const rows = hertz.map((f, i) => {
    const turn = (k: number) => [Math.cos(i * k), Math.sin(i * k)];
    const [dr, di] = turn(0.3);
    const [tr, ti] = turn(0.2);
    const [mr, mi] = turn(0.1);
    const re = nominal + d * dr + t * nominal * tr + m * nominal * nominal * mr;
    const im = d * di + t * nominal * ti + m * nominal * nominal * mi;
    return `${f} ${re} ${im}`;
  });
  return `# Hz S RI R 50\n${rows.join('\n')}\n`;
}

describe('checks of an analyzer with known loads', () => {
  let club: TestApp;
  beforeAll(async () => {
    club = await makeTestApp();
    const payload = { key: 'bench', name: 'Bench' };
    await club.call({ method: 'POST', url: '/v1/analyzers', payload });
  });
  afterAll(() => club.close());

  const url = '/v1/analyzers/bench/load-checks';
  const send = (load: string, payload: string, query = '') =>
    club.call({
      method: 'POST',
      url: `${url}?load=${load}${query}`,
      payload,
      headers: { 'content-type': 'application/octet-stream' },
    });

  it('tell nothing before there is one', async () => {
    const { items, residual } = (await club.call({ url })).json();
    expect(items).toEqual([]);
    expect(residual.errors).toBeNull();
    expect(residual.detail).toMatch(/no sweep of a known load/);
  });

  it('are kept with their file, and the same bytes make no twin', async () => {
    const file = readingOf(0, { d: 0.01 });
    const first = await send('50', file, '&measured_at=2026-05-01T00:00:00Z&note=morning');
    expect(first.statusCode).toBe(201);
    expect(first.json()).toMatchObject({ load: 50, note: 'morning', points: 41 });
    const again = await send('50', file);
    expect(again.statusCode).toBe(200);
    expect(again.json().id).toBe(first.json().id);
  });

  it('of one load tell the directivity alone: 0.01 is 40 dB', async () => {
    const { residual } = (await club.call({ url })).json();
    expect(residual.errors.directivity_db).toBeCloseTo(40, 6);
    expect(residual.errors).toMatchObject({ source_match_db: null, tracking_db: null });
  });

  it('of load, open and short tell all three errors', async () => {
    const errors = { d: 0.01, t: 0.02, m: 0.03 };
    const loads = [
      ['50', 0],
      ['open', 1],
      ['short', -1],
    ] as const;
    for (const [load, nominal] of loads) {
      const file = `! newer\n${readingOf(nominal, errors)}`;
      expect((await send(load, file, '&measured_at=2026-05-02T00:00:00Z')).statusCode).toBe(201);
    }
    const { items, residual } = (await club.call({ url })).json();
    expect(items).toHaveLength(4);
    expect(residual.from_checks).toHaveLength(3);
    expect(residual.errors.directivity_db).toBeCloseTo(40, 6);
    expect(residual.errors.tracking_db).toBeCloseTo(20 * Math.log10(1.02), 6);
    expect(residual.errors.source_match_db).toBeCloseTo(-20 * Math.log10(0.03), 6);
  });

  it('are refused with a load that is none, in the future, or as a broken file', async () => {
    expect((await send('-5', readingOf(0))).statusCode).toBe(400);
    expect(
      (await send('50', readingOf(0), '&measured_at=2030-01-01T00:00:00Z')).json(),
    ).toMatchObject({
      type: expect.stringContaining('implausible-fact'),
    });
    expect((await send('50', '# MHz S RI R 50\n1 x y\n')).statusCode).toBe(422);
  });

  it('belong to an analyzer of the club', async () => {
    const none = await club.call({ url: '/v1/analyzers/nobody/load-checks' });
    expect(none.statusCode).toBe(404);
  });
});
