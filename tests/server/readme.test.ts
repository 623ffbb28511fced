import { readFileSync } from 'node:fs';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { sampleFile } from '../../server/sample-file.ts';
import { addAntenna, upload } from '../support/club-records.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

const readme = readFileSync(new URL('../../README.md', import.meta.url), 'utf8');
const [record, report] = [...readme.matchAll(/```json\n(.*?)```/gs)].map(([, json]) =>
  JSON.parse(json),
);

/** The same value, with room for the last digits of a number and for another id. */
function likeIt(value: unknown): unknown {
  if (typeof value === 'number') {
    return expect.closeTo(value, value === 0 ? 6 : 4 - Math.floor(Math.log10(Math.abs(value))));
  }
  if (Array.isArray(value)) return value.map(likeIt);
  if (typeof value !== 'object' || value === null) return value;
  const fields = Object.entries(value).filter(([name]) => name !== 'id');
  return expect.objectContaining(
    Object.fromEntries(fields.map(([name, inner]) => [name, likeIt(inner)])),
  );
}

describe('the README', () => {
  let club: TestApp;
  let answer: Awaited<ReturnType<typeof upload>>;
  beforeAll(async () => {
    club = await makeTestApp();
    await addAntenna(club);
    const [, text] = /printf '([^']*)'/.exec(readme) ?? [];
    answer = await upload(club, text.replaceAll('\\n', '\n'), '?file_name=first.s1p');
  });
  afterAll(() => club.close());

  it('uploads the file that the first start prints', () => {
    expect(readme).toContain(`printf '${sampleFile.replaceAll('\n', '\\n')}'`);
  });

  it('shows what an upload answers', () => {
    expect(answer.statusCode).toBe(201);
    expect(answer.json()).toEqual(likeIt(record));
  });

  it('shows what a usable-band report says', async () => {
    const usable = await club.call({ url: `/v1/sweeps/${answer.json().id}/usable` });
    expect(usable.json()).toEqual(likeIt(report));
  });
});
