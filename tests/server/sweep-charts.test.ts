import { afterAll, beforeAll, describe, expect, it } from 'vitest';
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

const get = (query = '', headers: Record<string, string> = {}) =>
  club.call({ url: `/v1/sweeps/${id}/chart.svg${query}`, headers });

/** Width and height of a PNG: the first fields of its header (ISO/IEC 15948, 11.2.2). */
function pngSize(bytes: Buffer): readonly [number, number] {
  expect(bytes.subarray(0, 8).toString('latin1')).toBe('\x89PNG\r\n\x1a\n');
  return [bytes.readUInt32BE(16), bytes.readUInt32BE(20)];
}

describe('a chart of a sweep over HTTP', () => {
  it('is SVG of the size that is asked for, and leads to its points', async () => {
    const answer = await get('?kind=swr&width=400&height=300');
    expect(answer.statusCode).toBe(200);
    expect(answer.headers['content-type']).toBe('image/svg+xml');
    expect(answer.body).toContain('width="400" height="300"');
    const link = `${testUrl}/v1/sweeps/${id}/points?as=csv`;
    expect(answer.headers['link']).toBe(`<${link}>; rel="alternate"; type="text/csv"`);
    expect(answer.body).toContain(link);
    const points = await club.call({ url: link.slice(testUrl.length) });
    expect(points.headers['content-type']).toContain('text/csv');
  });

  it.each(['swr', 'impedance', 'smith'])('can be of kind %s', async (kind) => {
    const { body } = await get(`?kind=${kind}&theme=print`);
    // Zero reactance of the resonator of 60 ohm: SWR 60/50 (any handbook: SWR = R/Z0 for R > Z0).
    expect(body).toMatch(/SWR is least at 14\.175 MHz: 1\.20/);
  });

  it('is PNG for those who accept that', async () => {
    const answer = await get('?width=500&height=300&theme=dark', { accept: 'image/png' });
    expect(answer.headers['content-type']).toBe('image/png');
    expect(answer.headers['vary']).toBe('Accept');
    expect(pngSize(answer.rawPayload)).toEqual([500, 300]);
    const again = await get('?width=500&height=300&theme=dark', { accept: 'image/svg+xml' });
    expect(again.headers['content-type']).toBe('image/svg+xml');
    expect(again.headers.etag).not.toBe(answer.headers.etag);
  });

  it('is refused to those who accept neither', async () => {
    expect((await get('', { accept: 'text/html' })).statusCode).toBe(406);
  });

  it('is not sent again to one who has it', async () => {
    const { headers } = await get('?kind=smith');
    const again = await get('?kind=smith', { 'if-none-match': String(headers.etag) });
    expect(again.statusCode).toBe(304);
    expect(again.headers['link']).toBe(headers['link']);
  });

  it('is another one after its antenna was given another name', async () => {
    const before = await get();
    const antenna = (await club.call({ url: '/v1/antennas' })).json().items[0];
    await club.call({
      method: 'PATCH',
      url: `/v1/antennas/${antenna.id}`,
      headers: { 'if-match': '*' },
      payload: { name: '<b>&"Renamed' },
    });
    const after = await get();
    expect(after.headers.etag).not.toBe(before.headers.etag);
    expect(after.body).toContain('&lt;b&gt;&amp;&quot;Renamed');
    expect(after.body).not.toContain('<b>');
  });

  it('may not run or load anything where it is opened as a file', async () => {
    expect((await get()).headers['content-security-policy']).toContain("default-src 'none'");
  });

  it('needs phase for R and X, and its sign for the Smith chart', async () => {
    const rows = ['14000000,1.5', '14100000,1.2', '14200000,1.4'];
    const scalar = ['frequency_hz,swr', ...rows].join('\n');
    const sweep = (await upload(club, scalar)).json();
    const chart = (kind: string) =>
      club.call({ url: `/v1/sweeps/${sweep.id}/chart.svg?kind=${kind}` });
    expect((await chart('swr')).statusCode).toBe(200);
    for (const kind of ['impedance', 'smith']) {
      const refused = await chart(kind);
      expect(refused.statusCode).toBe(409);
      expect(refused.json()).toMatchObject({ type: `${testUrl}/problems/phase-unknown` });
    }
  });

  it('cannot be given at the feed point while the feed line is not known', async () => {
    expect((await get('?plane=feed_point')).statusCode).toBe(409);
  });

  it.each(['width=100', 'height=9999', 'theme=pink', 'numbers=!', 'kind=pie', 'plane=moon', 'x=1'])(
    'refuses %s',
    async (query) => {
      expect((await get(`?${query}`)).statusCode).toBe(400);
    },
  );
});
