import { createHash } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { addAntenna, resonatorFile, upload } from '../support/club-records.ts';
import { makeTestApp, type TestApp, testUrl } from '../support/test-app.ts';

let club: TestApp;
let id: string;
const file = resonatorFile();
const unknown = '019ad9a1-7a00-7000-8000-000000000001';

beforeAll(async () => {
  club = await makeTestApp();
  await addAntenna(club);
  id = (await upload(club, file, '?measured_at=2026-05-17T14:30:00Z')).json().id;
});
afterAll(() => club.close());

describe('a sweep', () => {
  it.each(['', '/file', '/points', '/summary', '/usable'])(
    'that there is not: %s',
    async (part) => {
      expect((await club.call({ url: `/v1/sweeps/${unknown}${part}` })).statusCode).toBe(404);
      expect((await club.call({ url: `/v1/sweeps/no-id${part}` })).statusCode).toBe(400);
    },
  );

  it.each(['', '/file', '/points', '/summary', '/usable'])(
    'is not sent again to a client that has it: %s',
    async (part) => {
      const url = `/v1/sweeps/${id}${part}`;
      const first = await club.call({ url });
      expect(first.statusCode).toBe(200);
      const headers = { 'if-none-match': `"other", W/${first.headers.etag}` };
      const again = await club.call({ url, headers });
      expect(again.statusCode).toBe(304);
      expect(again.body).toBe('');
      expect(again.headers.etag).toBe(first.headers.etag);
    },
  );
});

describe('the file of a sweep', () => {
  it('comes back byte for byte, with its digest', async () => {
    const answer = await club.call({ url: `/v1/sweeps/${id}/file` });
    expect(answer.rawPayload.equals(Buffer.from(file))).toBe(true);
    const digest = createHash('sha256').update(file);
    expect(answer.headers['repr-digest']).toBe(`sha-256=:${digest.copy().digest('base64')}:`);
    expect(answer.headers.etag).toBe(`"sha256-${digest.digest('hex')}"`);
  });

  it('is a download that no browser runs, frames or guesses at', async () => {
    const { headers } = await club.call({ url: `/v1/sweeps/${id}/file` });
    expect(headers['content-disposition']).toMatch(
      /^attachment; filename="sweep-2026-05-17-[0-9a-f]{8}\.s1p"$/,
    );
    expect(headers['content-type']).toBe('application/octet-stream');
    expect(headers['x-content-type-options']).toBe('nosniff');
    expect(headers['content-security-policy']).toBe("sandbox; default-src 'none'");
    expect(headers['cache-control']).toBe('private, max-age=31536000, immutable');
  });
});

describe('the sweeps of an antenna', () => {
  it('are listed newest first, by pages, each once', async () => {
    const times = ['2026-05-20', '2026-05-18', '2026-05-19'];
    for (const day of times) {
      const query = `?measured_at=${day}T08:00:00Z`;
      expect((await upload(club, resonatorFile({ comment: day }), query)).statusCode).toBe(201);
    }
    const seen: string[] = [];
    let next: string | undefined = '/v1/antennas/field-20m/sweeps?limit=3';
    while (next !== undefined) {
      const page = await club.call({ url: next });
      seen.push(...page.json().items.map((item: { measured_at: string }) => item.measured_at));
      const link = /^<([^>]*)>; rel="next"$/.exec(String(page.headers.link ?? ''));
      next = link?.[1].slice(testUrl.length);
    }
    expect(seen.map((time) => time.slice(0, 10))).toEqual([
      '2026-05-20',
      '2026-05-19',
      '2026-05-18',
      '2026-05-17',
    ]);
  });

  it('are not those of an antenna that there is not', async () => {
    expect((await club.call({ url: '/v1/antennas/nowhere/sweeps' })).statusCode).toBe(404);
  });
});
