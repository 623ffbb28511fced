import { createHash } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { addAntenna, resonatorFile, upload } from '../support/club-records.ts';
import { makeTestApp, type TestApp, testUrl } from '../support/test-app.ts';

const sha256 = (bytes: string | Buffer) => createHash('sha256').update(bytes);
const digestOf = (bytes: string | Buffer) => `sha-256=:${sha256(bytes).digest('base64')}:`;

let club: TestApp;
let files = 0;
/** A file that the club does not hold yet. */
const freshFile = () => resonatorFile({ comment: `file ${files++}` });

beforeAll(async () => {
  club = await makeTestApp();
  await addAntenna(club);
});
afterAll(() => club.close());

async function countOfSweeps(): Promise<number> {
  const list = await club.call({ url: '/v1/antennas/field-20m/sweeps?limit=500' });
  return list.json().items.length;
}

describe('an upload', () => {
  it('answers 201 with the record, its place and its summary', async () => {
    const file = freshFile();
    const answer = await upload(
      club,
      file,
      '?file_name=a.s1p&measured_at=2026-05-17T16:30:00%2B02:00&conditions=dry&note=first',
    );
    expect(answer.statusCode).toBe(201);
    const record = answer.json();
    expect(answer.headers.location).toBe(`${testUrl}/v1/sweeps/${record.id}`);
    expect(record).toMatchObject({
      measured_at: '2026-05-17T14:30:00.000Z',
      received_at: '2026-06-01T12:00:00.000Z',
      conditions: 'dry',
      note: 'first',
      analyzer_id: null,
      plane: 'measured',
      invented: false,
      uploaded_by: club.actor.memberId,
      file: {
        sha256: sha256(file).digest('hex'),
        bytes: file.length,
        name: 'a.s1p',
        format: 'touchstone-1',
        columns: null,
      },
      phase: 'signed',
      reference_ohm: 50,
      points: 111,
      low_hz: 13_900_000,
      high_hz: 14_450_000,
    });
    expect(record.summary.sweep_id).toBe(record.id);
    expect(record.summary.minimum_swr.frequency_hz).toBeCloseTo(14_175_000, -3);
    expect(record.summary.resonances).toHaveLength(1);
  });

  it('can be read back as it was answered', async () => {
    const answer = await upload(club, freshFile());
    const read = await club.call({ url: String(answer.headers.location).slice(testUrl.length) });
    expect(read.json()).toEqual(answer.json());
  });

  it('of the same bytes again answers 200 and the first record, never a twin', async () => {
    const file = freshFile();
    const first = await upload(club, file, '?note=first');
    const before = await countOfSweeps();
    club.clock.ms += 1000;
    const second = await upload(club, file, '?note=second');
    expect(second.statusCode).toBe(200);
    expect(second.body).toBe(first.body);
    expect(second.headers.location).toBe(first.headers.location);
    expect(await countOfSweeps()).toBe(before);
  });

  it('of the same bytes at the same time makes one record', async () => {
    const file = freshFile();
    const answers = await Promise.all(Array.from({ length: 10 }, () => upload(club, file)));
    const statuses = answers.map((answer) => answer.statusCode).sort();
    expect(statuses).toEqual([...Array(9).fill(200), 201]);
    expect(new Set(answers.map((answer) => answer.json().id)).size).toBe(1);
  });

  it('of bytes that are the record of another antenna is refused with a link to it', async () => {
    const file = freshFile();
    const first = (await upload(club, file)).json();
    await addAntenna(club, { key: 'field-40m' });
    const answer = await club.call({
      method: 'POST',
      url: '/v1/antennas/field-40m/sweeps',
      payload: file,
    });
    expect(answer.statusCode).toBe(409);
    const url = `${testUrl}/v1/sweeps/${first.id}`;
    expect(answer.json().existing).toEqual({
      sweep_id: first.id,
      antenna_id: first.antenna_id,
      url,
    });
    expect(answer.headers.link).toBe(`<${url}>; rel="related"`);
  });

  it('names an analyzer of the club by its key', async () => {
    const payload = { key: 'bench', name: 'Bench analyzer' };
    const analyzer = await club.call({ method: 'POST', url: '/v1/analyzers', payload });
    const answer = await upload(club, freshFile(), '?analyzer=bench');
    expect(answer.json().analyzer_id).toBe(analyzer.json().id);
  });

  it('is taken under any content type, and under none', async () => {
    for (const type of ['text/plain', 'application/json', 'application/x-www-form-urlencoded']) {
      const answer = await upload(club, freshFile(), '', { 'content-type': type });
      expect(answer.statusCode).toBe(201);
    }
    const url = '/v1/antennas/field-20m/sweeps';
    const bare = await club.call({ method: 'POST', url, payload: Buffer.from(freshFile()) });
    expect(bare.statusCode).toBe(201);
  });

  it('to an antenna that there is not answers 404', async () => {
    const url = '/v1/antennas/nowhere/sweeps';
    const answer = await club.call({ method: 'POST', url, payload: freshFile() });
    expect(answer.statusCode).toBe(404);
  });
});

describe('an upload as a form', () => {
  const form = (parts: readonly string[]) =>
    upload(club, `${parts.map((part) => `--b\r\n${part}\r\n`).join('')}--b--\r\n`, '', {
      'content-type': 'multipart/form-data; boundary=b',
    });
  const disposition = 'Content-Disposition: form-data';
  const filePart = (file: string) =>
    `${disposition}; name="file"; filename="form.s1p"\r\nContent-Type: text/plain\r\n\r\n${file}`;

  it('keeps the bytes and the name of its one part', async () => {
    const file = freshFile();
    const answer = await form([filePart(file)]);
    expect(answer.statusCode).toBe(201);
    expect(answer.json().file).toMatchObject({
      name: 'form.s1p',
      sha256: sha256(file).digest('hex'),
    });
  });

  it('is refused with another part, or with none', async () => {
    const note = `${disposition}; name="note"\r\n\r\nhello`;
    expect((await form([filePart(freshFile()), note])).statusCode).toBe(400);
    expect((await form([note])).statusCode).toBe(400);
    const two = [filePart(freshFile()), filePart(freshFile())];
    expect((await form(two)).statusCode).toBe(400);
  });

  it('is refused when it is broken', async () => {
    const headers = { 'content-type': 'multipart/form-data; boundary=b' };
    const answer = await upload(club, 'no boundary here', '', headers);
    expect(answer.statusCode).toBe(400);
    expect(answer.json().type).toBe(`${testUrl}/problems/malformed-request`);
  });
});

describe('Content-Digest of an upload', () => {
  it('that fits lets it through', async () => {
    const file = freshFile();
    const answer = await upload(club, file, '', { 'content-digest': digestOf(file) });
    expect(answer.statusCode).toBe(201);
    expect(answer.headers['repr-digest']).toBe(digestOf(answer.body));
  });

  it('that does not fit refuses it, and nothing is kept', async () => {
    const before = await countOfSweeps();
    const headers = { 'content-digest': digestOf('other bytes') };
    const answer = await upload(club, freshFile(), '', headers);
    expect(answer.statusCode).toBe(400);
    expect(answer.json().type).toBe(`${testUrl}/problems/digest-mismatch`);
    expect(await countOfSweeps()).toBe(before);
  });

  it('without SHA-256 refuses it and says what is wanted', async () => {
    const answer = await upload(club, freshFile(), '', { 'content-digest': 'md5=:AAAA:' });
    expect(answer.json().type).toBe(`${testUrl}/problems/digest-unsupported`);
    expect(answer.headers['want-content-digest']).toBe('sha-256=10');
  });
});

describe('a file that cannot be read', () => {
  let before: number;
  beforeEach(async () => {
    before = await countOfSweeps();
  });
  const refused = async (
    answer: Awaited<ReturnType<typeof upload>>,
    status: number,
    slug: string,
  ) => {
    expect(answer.json()).toMatchObject({ status, type: `${testUrl}/problems/${slug}` });
    expect(answer.statusCode).toBe(status);
    expect(await countOfSweeps()).toBe(before);
  };

  it('answers 422 with line, column and remedy, and nothing is kept', async () => {
    const answer = await upload(club, '# MHZ S RI R 50\n14.0 0.1 0.2\n14.1 0.1 zero\n');
    await refused(answer, 422, 'unreadable-file');
    const { code, remedy, errors } = answer.json();
    expect(code).toEqual(expect.any(String));
    expect(remedy).toEqual(expect.any(String));
    expect(errors[0]).toMatchObject({ line: 3, column: expect.any(Number) });
  });

  it('answers 415 when it is of no kind that is read here', async () => {
    const image = Buffer.from('89504e470d0a1a0a0000000d49484452', 'hex');
    await refused(await upload(club, image), 415, 'unknown-file-kind');
  });

  it('answers 422 with the columns to confirm when they are not certain', async () => {
    const rows = [14, 14.1, 14.2, 14.3].map((mhz, i) => `${mhz},${1.4 + i / 10},${30 + i}`);
    const answer = await upload(club, `a,b,c\n${rows.join('\n')}\n`);
    await refused(answer, 422, 'columns-to-confirm');
    const { proposal } = answer.json();
    expect(proposal).toMatchObject({ columns: expect.any(String), evidence: expect.any(Array) });
    expect(proposal.first_rows[0]).toEqual(['14', '1.4', '30']);
  });

  it('answers 413 when it is too large, as the body or as a form', async () => {
    const small = await makeTestApp({ limits: { maxBytes: 2000 } });
    await addAntenna(small);
    const file = resonatorFile();
    const disposition = 'Content-Disposition: form-data; name="file"; filename="a"';
    const form = `--b\r\n${disposition}\r\n\r\n${file}\r\n--b--\r\n`;
    const type = { 'content-type': 'multipart/form-data; boundary=b' };
    for (const answer of [await upload(small, file), await upload(small, form, '', type)]) {
      expect(answer.statusCode).toBe(413);
      expect(answer.json().type).toBe(`${testUrl}/problems/too-large`);
    }
    await small.close();
  });

  it('answers 413 when it has too many points', async () => {
    const small = await makeTestApp({ limits: { maxPoints: 100 } });
    await addAntenna(small);
    const answer = await upload(small, resonatorFile({ points: 101 }));
    expect(answer.statusCode).toBe(413);
    await small.close();
  });

  it('answers 415 when it is compressed in transfer in a way that is not taken', async () => {
    const answer = await upload(club, freshFile(), '', { 'content-encoding': 'br' });
    await refused(answer, 415, 'unsupported-media-type');
  });
});

describe('a fact about a sweep', () => {
  it.each([
    ['measured_at=2026-05-17T14:30:00', 400, 'measured_at'],
    ['measured_at=yesterday', 400, 'measured_at'],
    ['measured_at=2026-06-03T12:00:00Z', 422, 'measured_at'],
    ['analyzer=nobody', 422, 'analyzer'],
    ['plane=antenna', 400, 'plane'],
    ['port=3', 400, 'port'],
    ['colour=red', 400, 'colour'],
    ['note=a&note=b', 400, 'note'],
  ])('%s is refused with %i', async (query, status, parameter) => {
    const answer = await upload(club, freshFile(), `?${query}`);
    expect(answer.statusCode).toBe(status);
    expect(answer.json().errors).toEqual([{ detail: expect.any(String), parameter }]);
  });

  it('that it was taken at the feed point is kept', async () => {
    const answer = await upload(club, freshFile(), '?plane=feed_point');
    expect(answer.json().plane).toBe('feed_point');
    expect(answer.json().summary.plane).toBe('feed_point');
  });
});
