import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { demoClub } from '../../../server/demo/demo-club.ts';
import { trimPairs } from '../../../server/history/trims.ts';
import { loadDemo } from '../../../server/load-demo.ts';
import { makeTestApp, type TestApp } from '../../support/test-app.ts';

/** What the demo's stories say is read off the histories by which a member would see it. */

interface Band {
  readonly band: string;
  readonly resonances: readonly { readonly frequency_hz: number }[];
  readonly minimum: { readonly frequency_hz: number; readonly swr: number };
}
interface Row {
  readonly measured_at: string;
  readonly weather: string;
  readonly temperature_c: number | null;
  readonly era: number;
  readonly bands: readonly Band[];
}

let club: TestApp;
beforeAll(async () => {
  club = await makeTestApp();
  club.clock.ms = Date.parse('2026-12-01T12:00:00Z');
  await loadDemo(club.service, club.actor, demoClub());
});
afterAll(() => club.close());

async function history(antenna: string, query: string): Promise<readonly Row[]> {
  const answer = await club.call({ url: `/v1/antennas/${antenna}/history?limit=100&${query}` });
  expect(answer.statusCode).toBe(200);
  return answer.json().items.toReversed();
}
const minimumHz = ({ bands }: Row) => bands[0].minimum.frequency_hz;
const minimumSwr = ({ bands }: Row) => bands[0].minimum.swr;

describe('the weather of the demo’s sweeps', () => {
  it('is a fact beside the words, and the temperature too', async () => {
    const rows = await history('hilltop-ocf', 'band=40m');
    expect(rows.map(({ weather }) => weather)).toEqual([
      'dry',
      'rain',
      'rain',
      'dry',
      'rain',
      'dry',
      'rain',
    ]);
    expect(rows[0].temperature_c).toBe(4);
  });
});

describe('the wire that stretches', () => {
  it('falls by about 0.3 % a year along one track', async () => {
    const answer = await club.call({
      url: '/v1/antennas/hilltop-40m/tracks?band=40m&analyzer=bench&weather=dry',
    });
    const { tracks } = answer.json();
    expect(tracks).toHaveLength(1);
    const { points } = tracks[0];
    expect(points.length).toBeGreaterThanOrEqual(8);
    expect(points.some(({ jumped }: { jumped: boolean }) => jumped)).toBe(false);
    const fall = 1 - points.at(-1).frequency_hz / points[0].frequency_hz;
    // The story's own figure over the 1.9 years between the first and the last sweep.
    expect(fall / 1.9).toBeGreaterThan(0.002);
    expect(fall / 1.9).toBeLessThan(0.004);
  });
});

describe('the beam that a storm bent', () => {
  it('is another one from the storm to the repair, with which an era begins', async () => {
    const rows = await history('boathouse-beam', 'band=15m');
    const before = rows.filter(({ measured_at }) => measured_at < '2026-01-17');
    const bent = rows.filter(
      ({ measured_at }) => measured_at > '2026-01-17' && measured_at < '2026-04-11',
    );
    const repaired = rows.filter(({ era }) => era === 1);
    expect([before.length, bent.length, repaired.length]).toEqual([4, 2, 3]);
    const soundHz = minimumHz(before[0]);
    for (const row of bent) expect(minimumHz(row) - soundHz).toBeGreaterThan(150_000);
    for (const row of repaired) expect(Math.abs(minimumHz(row) - soundHz)).toBeLessThan(60_000);
    expect(bent.every(({ era }) => era === 0)).toBe(true);
  });
});

describe('the box that leaks', () => {
  it('changes the SWR when it is wet, and only since then', async () => {
    const rows = await history('hilltop-ocf', 'band=40m');
    const [first, rain, wet, dryAgain] = rows.map(minimumSwr);
    expect(Math.abs(rain - first)).toBeLessThan(0.05);
    expect(Math.abs(dryAgain - first)).toBeLessThan(0.05);
    expect(Math.abs(wet - first)).toBeGreaterThan(0.1);
  });
});

describe('the analyzer that is off', () => {
  it('reads the same antenna 0.3 % higher within an hour', async () => {
    const day = 'band=40m&from=2026-05-16T09:00:00Z&until=2026-05-16T09:30:00Z';
    const [bench, handheld] = (await history('hilltop-40m', day)).map(minimumHz);
    expect(handheld / bench - 1).toBeGreaterThan(0.002);
    expect(handheld / bench - 1).toBeLessThan(0.004);
  });
});

describe('the dipole that was trimmed', () => {
  it('teaches how it answers to a change of length', async () => {
    const { clubId } = club.actor;
    const antenna = await club.service.store.findEditable('antennas', clubId, 'boathouse-10m');
    if (antenna === null) throw new Error('The demo has it.');
    const pairs = await trimPairs(club.service, antenna);
    expect(pairs).toHaveLength(1);
    expect(pairs[0].lengthChangeM).toBe(-0.1);
    // The story's own figure: 10 cm shorter, about 0.6 MHz higher.
    expect(pairs[0].frequencyChangeHz).toBeGreaterThan(450_000);
    expect(pairs[0].frequencyChangeHz).toBeLessThan(700_000);
  });
});
