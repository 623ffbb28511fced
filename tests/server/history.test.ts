import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { addAntenna, resonatorFile, upload } from '../support/club-records.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

const url = '/v1/antennas/field-20m/history';
const resonancesHz = [14_100_000, 14_120_000, 14_140_000, 14_200_000];
let club: TestApp;

interface Row {
  readonly sweep_id: string;
  readonly era: number;
  readonly weather: string | null;
  readonly max_swr: number;
  readonly bands: readonly {
    readonly band: string;
    readonly resonances: readonly { readonly frequency_hz: number }[];
    readonly minimum: { readonly swr: number; readonly frequency_hz: number } | null;
    readonly span: { readonly width_hz: number; readonly max_swr: number } | null;
  }[];
}

async function rows(query = ''): Promise<readonly Row[]> {
  const answer = await club.call({ url: `${url}${query}` });
  expect(answer.statusCode).toBe(200);
  return answer.json().items;
}
const foundHz = (row: Row) => row.bands[0]?.resonances[0]?.frequency_hz;

beforeAll(async () => {
  club = await makeTestApp();
  await addAntenna(club);
  await club.call({ method: 'POST', url: '/v1/analyzers', payload: { key: 'bench', name: 'B' } });
  const told = [
    'weather=dry&analyzer=bench&temperature_c=12.5&wind_m_s=3&ground=moist',
    'weather=rain&analyzer=bench&conditions=%3D1%2B1',
    'weather=dry',
    '',
  ];
  for (const [i, resonanceHz] of resonancesHz.entries()) {
    const file = resonatorFile({ resonanceHz, comment: `sweep ${i}` });
    const answer = await upload(club, file, `?measured_at=2026-0${i + 1}-10T10:00:00Z&${told[i]}`);
    expect(answer.statusCode).toBe(201);
  }
  for (const payload of [
    { kind: 'inspected', done_at: '2026-02-20T10:00:00Z' },
    { kind: 'trimmed', done_at: '2026-03-20T10:00:00Z', length_mm: 20 },
  ]) {
    await club.call({ method: 'POST', url: '/v1/antennas/field-20m/work', payload });
  }
});
afterAll(() => club.close());

describe('the history of an antenna', () => {
  it('has what each sweep measured, newest first', async () => {
    const found = (await rows()).map(foundHz);
    expect(found).toHaveLength(4);
    resonancesHz.toReversed().forEach((hz, i) => {
      expect(Math.abs((found[i] ?? 0) - hz)).toBeLessThan(5);
    });
  });

  it('tells the lowest SWR and the span within the limit with it', async () => {
    const [{ bands }] = await rows('?limit=1');
    // R = 60 ohm at resonance against 50 ohm: SWR 60/50.
    expect(bands[0].minimum?.swr).toBeCloseTo(1.2, 2);
    expect(bands[0].span?.max_swr).toBe(2);
    expect(bands[0].span?.width_hz).toBeGreaterThan(100_000);
  });

  it('keeps conditions as facts beside the member’s own words', async () => {
    const answer = await club.call({ url: `${url}?until=2026-02-01T00:00:00Z` });
    expect(answer.json().items[0]).toMatchObject({
      weather: 'dry',
      wind_m_s: 3,
      temperature_c: 12.5,
      ground: 'moist',
      conditions: null,
    });
  });

  it('begins a new era with work, but not with an inspection', async () => {
    expect((await rows()).map(({ era }) => era)).toEqual([1, 0, 0, 0]);
  });

  it('is limited by weather, by analyzer, by time and by band', async () => {
    expect((await rows('?weather=dry')).map(({ weather }) => weather)).toEqual(['dry', 'dry']);
    expect(await rows('?weather=unknown')).toHaveLength(1);
    expect(await rows('?analyzer=bench')).toHaveLength(2);
    expect(await rows('?analyzer=unknown')).toHaveLength(2);
    expect(await rows('?analyzer=bench&weather=rain')).toHaveLength(1);
    expect(await rows('?from=2026-03-10T10:00:00Z')).toHaveLength(2);
    expect(await rows('?until=2026-03-10T10:00:00Z')).toHaveLength(2);
    expect(await rows('?band=20m')).toHaveLength(4);
    expect(await rows('?band=40m')).toHaveLength(0);
  });

  it('goes on by pages that neither lose nor repeat a sweep', async () => {
    const seen: string[] = [];
    let next: string | null = '';
    while (next !== null) {
      const page: string = next === '' ? '' : `&cursor=${next}`;
      const answer = await club.call({ url: `${url}?limit=3&band=20m${page}` });
      const { items, page: told } = answer.json();
      seen.push(...items.map((row: Row) => row.sweep_id));
      next = told.next;
    }
    expect(seen).toEqual((await rows()).map(({ sweep_id }) => sweep_id));
  });

  it('refuses an analyzer that there is not', async () => {
    expect((await club.call({ url: `${url}?analyzer=none` })).statusCode).toBe(422);
  });
});

describe('a history as comma-separated text', () => {
  it('has a line for each resonance, and nothing that a spreadsheet would run', async () => {
    const answer = await club.call({ url, headers: { accept: 'text/csv' } });
    expect(answer.headers['content-type']).toBe('text/csv; charset=utf-8');
    const [header, ...lines] = answer.body.trimEnd().split('\r\n');
    expect(lines).toHaveLength(4);
    const cells = (line: string) => line.split(',');
    expect(new Set(lines.map((line) => cells(line).length))).toEqual(
      new Set([cells(header).length]),
    );
    const inRain = cells(lines[2]);
    expect(inRain[cells(header).indexOf('conditions')]).toBe("'=1+1");
    expect(Number(inRain[cells(header).indexOf('resonance_hz')])).toBeCloseTo(14_120_000, -2);
  });

  it('is had by the query as well, page by page', async () => {
    const answer = await club.call({ url: `${url}?as=csv&limit=1` });
    expect(answer.body.trimEnd().split('\r\n')).toHaveLength(2);
    expect(answer.headers.link).toContain('rel="next"');
  });
});

describe('an antenna whose limit was edited', () => {
  it('has its whole history at the new limit', async () => {
    const antenna = '/v1/antennas/field-20m';
    await club.call({
      method: 'PATCH',
      url: antenna,
      headers: { 'if-match': '*' },
      payload: { max_swr: 1.5 },
    });
    const [before] = await rows('?limit=1');
    expect(before.bands[0].span?.max_swr).toBe(1.5);
    expect(before.max_swr).toBe(1.5);
    // Made anew once, then kept: the second reading finds them on the present basis.
    const { id } = (await club.call({ url: antenna })).json();
    const { clubId } = club.actor;
    const kept = await club.service.store.listHistory(clubId, id, {}, { limit: 1, after: null });
    expect(kept.items[0].stored?.measures.maxSwr).toBe(1.5);
  });
});
