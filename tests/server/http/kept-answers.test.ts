import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { addAntenna, resonatorFile, upload } from '../../support/club-records.ts';
import { makeTestApp, type TestApp } from '../../support/test-app.ts';

let club: TestApp;
let id: string;

beforeAll(async () => {
  club = await makeTestApp();
  await addAntenna(club);
  id = (await upload(club, resonatorFile())).json().id;
});
afterAll(() => club.close());

const usable = (query = '') => club.call({ url: `/v1/sweeps/${id}/usable${query}` });

describe('a report that is asked again', () => {
  it('is the same, and nothing is read for it', async () => {
    const first = await usable();
    const reads = vi.spyOn(club.service.store, 'findSweep');
    const again = await usable();
    expect(reads).not.toHaveBeenCalled();
    reads.mockRestore();
    expect(again.body).toBe(first.body);
    expect(again.headers.etag).toBe(first.headers.etag);
    expect(again.headers['content-type']).toBe(first.headers['content-type']);
  });

  it('is another one after the antenna was edited', async () => {
    const before = await usable();
    const edit = await club.call({
      method: 'PATCH',
      url: '/v1/antennas/field-20m',
      headers: { 'if-match': '*' },
      payload: { max_swr: 1.3 },
    });
    expect(edit.statusCode).toBe(200);
    const after = await usable();
    expect(after.json().max_swr).toBe(1.3);
    expect(after.headers.etag).not.toBe(before.headers.etag);
  });

  it('is not that of another query', async () => {
    expect((await usable('?max_swr=3')).json().max_swr).toBe(3);
    expect((await usable('?max_swr=4')).json().max_swr).toBe(4);
  });

  it('needs a token each time', async () => {
    await usable();
    const answer = await club.call({
      url: `/v1/sweeps/${id}/usable`,
      headers: { authorization: 'Bearer none' },
    });
    expect(answer.statusCode).toBe(401);
  });
});
