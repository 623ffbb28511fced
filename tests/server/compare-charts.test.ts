import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { addAntenna, resonatorFile, upload } from '../support/club-records.ts';
import { pathPoints } from '../support/read-chart.ts';
import { makeTestApp, type TestApp, testUrl } from '../support/test-app.ts';

let club: TestApp;
let url: string;

beforeAll(async () => {
  club = await makeTestApp();
  await addAntenna(club);
  const before = await upload(club, resonatorFile({ resonanceHz: 14_150_000 }));
  const after = await upload(club, resonatorFile({ resonanceHz: 14_200_000 }));
  url = `/v1/sweeps/${before.json().id}/compare/${after.json().id}`;
});
afterAll(() => club.close());

describe('a chart of two sweeps over HTTP', () => {
  it('has both, says what changed and leads to the figures', async () => {
    const { body, headers } = await club.call({ url: `${url}/chart.svg` });
    expect(pathPoints(body, 'first').length).toBeGreaterThan(5);
    expect(pathPoints(body, 'second').length).toBeGreaterThan(5);
    expect(body).toContain('20m: series resonance 14.150 MHz, then 14.200 MHz.');
    expect(headers['link']).toContain(`<${testUrl}${url}>`);
  });

  it('is not sent again until a sweep is judged otherwise', async () => {
    const { etag } = (await club.call({ url: `${url}/chart.svg` })).headers;
    const known = { 'if-none-match': String(etag) };
    expect((await club.call({ url: `${url}/chart.svg`, headers: known })).statusCode).toBe(304);
    await club.call({
      method: 'PATCH',
      url: '/v1/antennas/field-20m',
      headers: { 'if-match': '*' },
      payload: { reference_ohm: 75 },
    });
    const after = await club.call({ url: `${url}/chart.svg`, headers: known });
    expect(after.statusCode).toBe(200);
    expect(after.body).toContain('SWR against 75 Ω');
  });

  it('is PNG for those who accept that', async () => {
    const headers = { accept: 'image/png' };
    const { rawPayload } = await club.call({ url: `${url}/chart.svg?width=400`, headers });
    expect(rawPayload.readUInt32BE(16)).toBe(400);
  });

  it('is not found where a sweep is not', async () => {
    const unknown = url.replace(/[^/]+$/, '019ad9a1-7a00-7000-8000-000000000001');
    expect((await club.call({ url: `${unknown}/chart.svg` })).statusCode).toBe(404);
  });
});
