import { gzipSync } from 'node:zlib';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { addAntenna, resonatorFile, upload } from '../support/club-records.ts';
import { makeTestApp, type TestApp, testUrl } from '../support/test-app.ts';
import { zipOf } from '../support/zip-file.ts';

const mostBytes = 300_000;
let club: TestApp;
beforeAll(async () => {
  club = await makeTestApp({ limits: { maxBytes: mostBytes } });
  await addAntenna(club);
});
afterAll(() => club.close());

let made = 0;
const freshFile = () => {
  made += 1;
  return Buffer.from(resonatorFile({ comment: `packed ${made}` }));
};
const kept = async (id: string) => (await club.call({ url: `/v1/sweeps/${id}/file` })).rawPayload;
const refused = (answer: { statusCode: number; json(): unknown }, status: number, slug: string) => {
  expect(answer.statusCode).toBe(status);
  expect(answer.json()).toMatchObject({ type: `${testUrl}/problems/${slug}` });
};

describe('a packed upload', () => {
  it.each([
    ['gzip as its encoding', (file: Buffer) => gzipSync(file), { 'content-encoding': 'gzip' }],
    ['a gzip file', (file: Buffer) => gzipSync(file), {}],
    ['a ZIP archive', (file: Buffer) => zipOf([{ name: 'walk/a.s1p', bytes: file }]), {}],
  ])('of %s keeps the file inside, byte for byte', async (_, packed, headers) => {
    const file = freshFile();
    const answer = await upload(club, packed(file), '', headers);
    expect(answer.statusCode, answer.body).toBe(201);
    expect(answer.json().file.bytes).toBe(file.length);
    expect((await kept(answer.json().id)).equals(file)).toBe(true);
    // Packed or not, it is the same file.
    expect((await upload(club, file)).statusCode).toBe(200);
  });

  it('is named by what stands in the archive, without its path', async () => {
    const archive = zipOf([
      { name: 'walk/', bytes: Buffer.alloc(0) },
      { name: 'walk/.hidden', bytes: Buffer.from('x') },
      { name: 'walk/tower.s1p', bytes: freshFile() },
    ]);
    expect((await upload(club, archive)).json().file.name).toBe('tower.s1p');
  });

  it('with the digest of what was sent passes the check of the transfer', async () => {
    const body = gzipSync(freshFile());
    const digest = await crypto.subtle.digest('SHA-256', new Uint8Array(body));
    const field = `sha-256=:${Buffer.from(digest).toString('base64')}:`;
    const headers = { 'content-encoding': 'gzip', 'content-digest': field };
    expect((await upload(club, body, '', headers)).statusCode).toBe(201);
  });
});

describe('a packed upload made to harm', () => {
  const zeros = Buffer.alloc(50_000_000);

  it.each([
    ['gzip', gzipSync(zeros), { 'content-encoding': 'gzip' }],
    ['a gzip file', gzipSync(zeros), {}],
    ['a ZIP archive', zipOf([{ name: 'a', bytes: zeros }]), {}],
    [
      'a ZIP archive that states a small size',
      zipOf([{ name: 'a', bytes: zeros, statedBytes: 100 }]),
      {},
    ],
  ])('of %s, small outside and large inside, is refused', async (_, body, headers) => {
    expect(body.length).toBeLessThan(mostBytes);
    const answer = await upload(club, body, '', headers);
    expect([413, 422]).toContain(answer.statusCode);
    expect(['too_many_bytes', 'packed_damaged']).toContain(answer.json().code);
  });

  it('by its ratio alone is refused, below the limit of bytes', async () => {
    const body = gzipSync(Buffer.alloc(mostBytes - 1));
    expect(body.length * 200).toBeLessThan(mostBytes);
    refused(await upload(club, body), 413, 'too-large');
  });

  it.each([
    ['two files', zipOf([1, 2].map((n) => ({ name: `${n}.s1p`, bytes: freshFile() })))],
    ['none', zipOf([])],
    ['an encrypted file', zipOf([{ name: 'a.s1p', bytes: freshFile(), encrypted: true }])],
    ['a path out of its folder', zipOf([{ name: '../../a.s1p', bytes: freshFile() }])],
    ['an absolute path', zipOf([{ name: '/etc/a.s1p', bytes: freshFile() }])],
    ['half of an archive', zipOf([{ name: 'a.s1p', bytes: freshFile() }]).subarray(0, 500)],
    ['half of a gzip file', gzipSync(freshFile()).subarray(0, 500)],
  ])('with %s is refused', async (_, body) => {
    refused(await upload(club, body), 422, 'unreadable-file');
  });

  it('in an encoding that is not taken is refused, with what is', async () => {
    const answer = await upload(club, freshFile(), '', { 'content-encoding': 'br' });
    refused(answer, 415, 'unsupported-media-type');
    expect(answer.headers['accept-encoding']).toBe('gzip, identity');
  });

  it('is not unpacked twice', async () => {
    const answer = await upload(club, gzipSync(gzipSync(freshFile())));
    refused(answer, 415, 'unknown-file-kind');
  });
});
