import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { addAntenna } from '../support/club-records.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

const url = '/v1/antennas/field-20m/work';
let club: TestApp;
beforeAll(async () => {
  club = await makeTestApp();
  await addAntenna(club);
  await addAntenna(club, { key: 'other' });
});
afterAll(() => club.close());

const tell = (payload: Readonly<Record<string, unknown>>, at = url) =>
  club.call({ method: 'POST', url: at, payload });

describe('work on an antenna', () => {
  it('is told with what was done, when, by how much and by whom', async () => {
    const told = {
      kind: 'trimmed',
      done_at: '2026-05-03T14:00:00+02:00',
      length_mm: 100,
      done_by: 'the Saturday crew',
      note: '5 cm off each end',
    };
    const answer = await tell(told);
    expect(answer.statusCode).toBe(201);
    const work = answer.json();
    expect(work).toMatchObject({ ...told, done_at: '2026-05-03T12:00:00.000Z', invented: false });
    const read = await club.call({ url: new URL(String(answer.headers.location)).pathname });
    expect(read.json()).toEqual(work);
  });

  it('needs no more than kind and time', async () => {
    const { length_mm, done_by, note } = (
      await tell({ kind: 'line_replaced', done_at: '2026-05-20T10:00:00Z' })
    ).json();
    expect([length_mm, done_by, note]).toEqual([null, null, '']);
  });

  it('changes the length by a tenth of a millimetre at least', async () => {
    const shortened = { kind: 'trimmed', done_at: '2026-05-03T12:00:00Z' };
    const answer = await tell({ ...shortened, length_mm: 2e-323 }, '/v1/antennas/other/work');
    expect(answer.statusCode).toBe(400);
    const least = await tell({ ...shortened, length_mm: 0.1 }, '/v1/antennas/other/work');
    expect(least.json().length_mm).toBe(0.1);
  });

  it('is listed newest first', async () => {
    const { items } = (await club.call({ url })).json();
    expect(items.map(({ kind }: { kind: string }) => kind)).toEqual(['line_replaced', 'trimmed']);
  });

  it('has a length only where the length was worked on', async () => {
    const answer = await tell({
      kind: 'moved',
      done_at: '2026-05-20T10:00:00Z',
      length_mm: 100,
    });
    expect(answer.statusCode).toBe(400);
    expect(answer.json().errors[0].pointer).toBe('#/length_mm');
  });

  it('is of a closed list of kinds', async () => {
    const answer = await tell({ kind: 'painted', done_at: '2026-05-20T10:00:00Z' });
    expect(answer.statusCode).toBe(400);
  });

  it('has been done already', async () => {
    const answer = await tell({ kind: 'moved', done_at: '2027-05-20T10:00:00Z' });
    expect(answer.statusCode).toBe(422);
    expect(answer.json().errors[0].pointer).toBe('#/done_at');
  });

  it('is not found under another antenna', async () => {
    const { items } = (await club.call({ url })).json();
    const answer = await club.call({ url: `/v1/antennas/other/work/${items[0].id}` });
    expect(answer.statusCode).toBe(404);
  });
});

describe('work that was told wrong', () => {
  it('is taken back for a reason, stays on record, and begins no era any more', async () => {
    const eras = async () =>
      (await club.call({ url: '/v1/antennas/field-20m/baselines' })).json().items.length;
    const before = await eras();
    const told = await tell({ kind: 'moved', done_at: '2026-04-20T10:00:00Z' });
    const { id } = told.json();
    expect(await eras()).toBe(before + 1);
    const withdraw = (reason: string) =>
      club.call({ method: 'POST', url: `${url}/${id}/withdrawal`, payload: { reason } });
    const answer = await withdraw('It was the other antenna.');
    expect(answer.statusCode).toBe(200);
    expect(answer.json()).toMatchObject({
      withdrawn_at: '2026-06-01T12:00:00.000Z',
      withdrawn_for: 'It was the other antenna.',
    });
    expect(await eras()).toBe(before);
    const { items } = (await club.call({ url })).json();
    expect(items).toContainEqual(answer.json());
    expect((await withdraw('Again.')).json()).toEqual(answer.json());
  });

  it('is that of the antenna in the path', async () => {
    const { items } = (await club.call({ url })).json();
    const answer = await club.call({
      method: 'POST',
      url: `/v1/antennas/other/work/${items[0].id}/withdrawal`,
      payload: { reason: 'x' },
    });
    expect(answer.statusCode).toBe(404);
  });
});
