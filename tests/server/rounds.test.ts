import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { addAntenna, resonatorFile, upload } from '../support/club-records.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

let club: TestApp;
const analyzers = ['first', 'second', 'third'];
const period = { begins_at: '2026-05-01T00:00:00Z', ends_at: '2026-05-20T00:00:00Z' };

beforeAll(async () => {
  // Time stands at 2026-06-01.
  club = await makeTestApp();
  await addAntenna(club);
  for (const key of analyzers) {
    await club.call({ method: 'POST', url: '/v1/analyzers', payload: { key, name: key } });
  }
});
afterAll(() => club.close());

async function plan(facts: object) {
  const payload = { name: 'Spring round', analyzers, ...period, ...facts };
  return club.call({ method: 'POST', url: '/v1/rounds', payload });
}

async function measure(analyzer: string, day: number, resonanceHz: number): Promise<void> {
  const file = resonatorFile({ resonanceHz, comment: `${analyzer} on day ${day}` });
  const at = `2026-05-${String(day).padStart(2, '0')}T12:00:00Z`;
  const answer = await upload(club, file, `?measured_at=${at}&analyzer=${analyzer}&weather=dry`);
  expect(answer.statusCode).toBe(201);
}

describe('a round over an antenna', () => {
  let url = '';

  it('is planned with its instruments and its dates', async () => {
    const answer = await plan({ antenna: 'field-20m' });
    expect(answer.statusCode).toBe(201);
    expect(answer.json()).toMatchObject({ name: 'Spring round', load: null });
    expect(answer.json().analyzer_ids).toHaveLength(3);
    url = String(answer.headers['location']).replace('http://ledger.example', '');
    expect((await club.call({ url })).json()).toMatchObject({ state: 'over', agreements: [] });
  });

  it('counts what each instrument measured in its time, and nothing else', async () => {
    await measure('first', 3, 14_100_000);
    await measure('first', 4, 14_100_400);
    await measure('second', 5, 14_100_900);
    await measure('second', 25, 14_300_000);
    const { state, instruments } = (await club.call({ url })).json();
    expect(state).toBe('over');
    expect(
      instruments.map(({ measurements }: { measurements: string[] }) => measurements.length),
    ).toEqual([2, 1, 0]);
  });

  it('is complete when every instrument measured, and tells how well they agree over its days', async () => {
    await measure('third', 12, 14_160_000);
    const { state, agreements } = (await club.call({ url })).json();
    expect(state).toBe('complete');
    const resonance = agreements.find(
      ({ measure: name }: { measure: string }) => name === 'resonance_hz',
    );
    expect(resonance).toMatchObject({ occasions: 1 });
    const biases = resonance.instruments.map(({ bias }: { bias: number }) => bias);
    expect(Math.max(...biases) - Math.min(...biases)).toBeCloseTo(Math.log(14_160 / 14_100.2), 5);
  });

  it('is under way or planned by the clock, and listed newest first', async () => {
    const later = { begins_at: '2026-05-30T00:00:00Z', ends_at: '2026-07-01T00:00:00Z' };
    const future = { begins_at: '2026-08-01T00:00:00Z', ends_at: '2026-08-09T00:00:00Z' };
    const states: string[] = [];
    for (const dates of [later, future]) {
      const { id } = (await plan({ antenna: 'field-20m', ...dates })).json();
      states.push((await club.call({ url: `/v1/rounds/${id}` })).json().state);
    }
    expect(states).toEqual(['under_way', 'planned']);
    const page = (await club.call({ url: '/v1/rounds?limit=2' })).json();
    expect(page.items.map(({ begins_at }: { begins_at: string }) => begins_at)).toEqual([
      '2026-08-01T00:00:00.000Z',
      '2026-05-30T00:00:00.000Z',
    ]);
  });
});

describe('a round over a load', () => {
  it('counts checks of that load', async () => {
    const { id } = (await plan({ load: 50 })).json();
    const check = async (load: string, day: string) => {
      const answer = await club.call({
        method: 'POST',
        url: `/v1/analyzers/first/load-checks?load=${load}&measured_at=2026-05-${day}T12:00:00Z&file_name=load.s1p`,
        payload: `# MHz S RI R 50\n! ${load} ${day}\n3.5 0.004 -0.001\n14 0.005 0.002\n28 0.003 0.004\n`,
        headers: { 'content-type': 'application/octet-stream' },
      });
      expect(answer.statusCode).toBe(201);
    };
    await check('50', '06');
    await check('50', '28');
    await check('100', '06');
    const round = (await club.call({ url: `/v1/rounds/${id}` })).json();
    expect(round).toMatchObject({ load: 50, antenna_id: null, state: 'over' });
    expect(round.instruments[0].measurements).toHaveLength(1);
  });
});

describe('a round that makes no sense', () => {
  it.each([
    ['of nothing', {}],
    ['of two things', { antenna: 'field-20m', load: 50 }],
    ['that ends before it began', { load: 50, ends_at: '2026-04-01T00:00:00Z' }],
    ['of one instrument', { load: 50, analyzers: ['first'] }],
  ])('is refused: %s', async (_, facts) => {
    expect((await plan(facts)).statusCode).toBe(400);
  });

  it('is refused with an instrument that the club has not, and named', async () => {
    const answer = await plan({ load: 50, analyzers: ['first', 'nobody'] });
    expect(answer.statusCode).toBe(422);
    expect(answer.json().errors[0].pointer).toBe('#/analyzers/1');
  });

  it('is not found under another id', async () => {
    const url = '/v1/rounds/01a23179-de00-76ac-8124-f62a27560dc6';
    expect((await club.call({ url })).statusCode).toBe(404);
  });
});
