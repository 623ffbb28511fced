import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { addAntenna, resonatorFile, upload } from '../support/club-records.ts';
import { makeTestApp, type TestApp, testUrl } from '../support/test-app.ts';

let club: TestApp;
let id: string;
let unsigned: string;
let scalar: string;

beforeAll(async () => {
  club = await makeTestApp();
  await addAntenna(club);
  id = (await upload(club, resonatorFile({ points: 5 }))).json().id;
  const rx = 'MHz,R,X\n14.0,40,10\n14.1,50,0\n14.2,60,10\n';
  const columns = 'columns=frequency:MHz,resistance,reactance_magnitude';
  unsigned = (await upload(club, rx, `?${columns}`)).json().id;
  const swr = 'MHz,SWR\n14.0,2\n14.1,1.5\n14.2,2\n';
  scalar = (await upload(club, swr, '?columns=frequency:MHz,swr')).json().id;
});
afterAll(() => club.close());

const points = (sweep: string, query = '', accept?: string) =>
  club.call({
    url: `/v1/sweeps/${sweep}/points${query}`,
    ...(accept === undefined ? {} : { headers: { accept } }),
  });

describe('the points of a sweep', () => {
  it('are JSON unless asked otherwise, one array for each quantity', async () => {
    const { frequency_hz, reflection_re, reflection_im, ...rest } = (await points(id)).json();
    expect(frequency_hz).toEqual([13_900_000, 14_037_500, 14_175_000, 14_312_500, 14_450_000]);
    // At resonance the resonator is 60 ohm: reflection 10/110.
    expect(reflection_re[2]).toBeCloseTo(10 / 110, 12);
    expect(reflection_im[2]).toBe(0);
    expect(rest).toMatchObject({ phase: 'signed', reference_ohm: 50 });
  });

  it.each(['json', 'touchstone'])('as %s read back as the same points', async (form) => {
    const answer = await points(id, `?as=${form}`);
    await addAntenna(club, { key: `copy-${form}` });
    const url = `/v1/antennas/copy-${form}/sweeps`;
    const copy = await club.call({ method: 'POST', url, payload: Buffer.from(answer.body) });
    expect(copy.statusCode).toBe(201);
    const [first, second] = [(await points(id)).json(), (await points(copy.json().id)).json()];
    expect({ ...second, note: first.note }).toEqual(first);
  });

  it('are CSV with a header when asked by Accept or by name', async () => {
    const byAccept = await points(id, '', 'text/csv');
    const byName = await points(id, '?as=csv', 'application/json');
    expect(byName.body).toBe(byAccept.body);
    expect(byAccept.headers['content-type']).toBe('text/csv; charset=utf-8');
    expect(byAccept.headers.vary).toMatch(/accept/i);
    const lines = byAccept.body.split('\r\n');
    expect(lines[0]).toBe(
      'frequency_hz,reflection_re,reflection_im,resistance_ohm,reactance_ohm,swr',
    );
    expect(lines).toHaveLength(7);
    const [hz, re, im, r, x, swr] = lines[3].split(',').map(Number);
    expect([hz, im, x]).toEqual([14_175_000, 0, 0]);
    expect(re).toBeCloseTo(10 / 110, 12);
    expect(r).toBeCloseTo(60, 9);
    expect(swr).toBeCloseTo(1.2, 12);
  });

  it('are Touchstone as a download when asked by name', async () => {
    const answer = await points(id, '?as=touchstone');
    expect(answer.headers['content-type']).toBe('text/plain; charset=utf-8');
    expect(answer.headers['content-disposition']).toMatch(/^attachment; filename="[\w-]+\.s1p"$/);
  });

  it('have a tag for each form', async () => {
    const tags = await Promise.all(
      ['json', 'csv', 'touchstone'].map(
        async (form) => (await points(id, `?as=${form}`)).headers.etag,
      ),
    );
    expect(new Set(tags).size).toBe(3);
  });

  it('cannot be had in a form that there is not', async () => {
    expect((await points(id, '', 'image/png')).statusCode).toBe(406);
    expect((await points(id, '?as=png')).statusCode).toBe(400);
  });

  it('cannot be had at the feed point while the feed line is not known', async () => {
    expect((await points(id, '?plane=feed_point')).statusCode).toBe(409);
  });
});

describe('the points of a sweep that lacks the sign of the reactance', () => {
  it('say magnitude where only that is known', async () => {
    expect((await points(unsigned)).json().phase).toBe('unsigned');
    const [header, ...rows] = (await points(unsigned, '?as=csv')).body.trimEnd().split('\r\n');
    const at = (name: string) => {
      const column = header.split(',').indexOf(name);
      return rows.map((row) => Number(row.split(',')[column]));
    };
    expect(header).not.toContain('reactance_ohm');
    expect(at('resistance_ohm')).toEqual([40, 50, 60].map((r) => expect.closeTo(r, 9)));
    expect(at('reactance_magnitude_ohm')).toEqual([10, 0, 10].map((x) => expect.closeTo(x, 9)));
  });

  it('cannot be Touchstone, which would claim a sign', async () => {
    for (const sweep of [unsigned, scalar]) {
      const answer = await points(sweep, '?as=touchstone');
      expect(answer.statusCode).toBe(409);
      expect(answer.json().type).toBe(`${testUrl}/problems/phase-unknown`);
    }
  });
});

describe('a sweep of SWR alone', () => {
  it('has the magnitude of the reflection and no impedance', async () => {
    const { reflection_magnitude, ...rest } = (await points(scalar)).json();
    // SWR 2 is a reflection of 1/3, SWR 1.5 one of 1/5 (any handbook).
    expect(reflection_magnitude).toEqual([1 / 3, 0.2, 1 / 3].map((r) => expect.closeTo(r, 12)));
    expect(rest).toMatchObject({ phase: 'none' });
    const csv = (await points(scalar, '?as=csv')).body;
    expect(csv.split('\r\n')[0]).toBe('frequency_hz,reflection_magnitude,swr');
  });

  it('is judged against the reference of its file only', async () => {
    const url = `/v1/sweeps/${scalar}/summary`;
    const own = (await club.call({ url })).json();
    expect(own).toMatchObject({ phase: 'none', resonances: [] });
    const same = `${url}?reference_ohm=${own.reference_ohm}`;
    expect((await club.call({ url: same })).statusCode).toBe(200);
    const other = await club.call({ url: `${url}?reference_ohm=75` });
    expect(other.statusCode).toBe(409);
    expect(other.json().errors).toEqual([
      { detail: expect.any(String), parameter: 'reference_ohm' },
    ]);
  });
});
