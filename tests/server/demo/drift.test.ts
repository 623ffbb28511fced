import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { demoClub } from '../../../server/demo/demo-club.ts';
import { loadDemo } from '../../../server/load-demo.ts';
import { makeTestApp, type TestApp } from '../../support/test-app.ts';

interface Finding {
  readonly code: string;
  readonly era: number;
  readonly measure: string | null;
  readonly detail: string;
  readonly evidence: readonly string[];
  readonly change: number | null;
  readonly since: string;
}

interface Bias {
  readonly measure: string;
  readonly analyzer_id: string;
  readonly bias: number;
  readonly off: boolean;
}

let club: TestApp;
beforeAll(async () => {
  club = await makeTestApp();
  club.clock.ms = Date.parse('2026-12-01T12:00:00Z');
  await loadDemo(club.service, club.actor, demoClub());
}, 120_000);
afterAll(() => club.close());

async function findings(antenna: string): Promise<readonly Finding[]> {
  const answer = await club.call({ url: `/v1/antennas/${antenna}/drift` });
  expect(answer.statusCode).toBe(200);
  return answer.json().bands.flatMap((band: { findings: Finding[] }) => band.findings);
}

describe('the demo club over two years', () => {
  it('has a wire that stretches, by 0.3 % a year', async () => {
    const found = await findings('hilltop-40m');
    expect(found.map(({ code }) => code)).toEqual(['slow_drift_down']);
    // The story: 0.6 % in two years.
    expect(found[0].change).toBeCloseTo(-0.003, 3);
  });

  it('has a sudden fault of the beam that the repair ended', async () => {
    const found = await findings('boathouse-beam');
    expect(found).toMatchObject([{ code: 'sudden_jump', era: 0 }]);
    expect(found[0].change).toBeGreaterThan(0.01);
    // The storm was on 17 January 2026.
    expect(found[0].since.slice(0, 7)).toBe('2026-01');
  });

  it('has an antenna that is other only when it is wet', async () => {
    const found = await findings('hilltop-ocf');
    expect(found.length).toBeGreaterThan(0);
    expect(new Set(found.map(({ code }) => code))).toEqual(new Set(['only_when_wet']));
    // Water gets in from September 2025 on.
    expect(found[0].since > '2025-09-01').toBe(true);
  });

  it.each(['hilltop-20m', 'hilltop-80m', 'boathouse-10m', 'boathouse-trap'])(
    'has nothing to say of %s, which is sound or trimmed on record',
    async (antenna) => {
      expect(await findings(antenna)).toEqual([]);
    },
  );

  it('tells the trend of each era with its interval', async () => {
    const answer = await club.call({ url: '/v1/antennas/boathouse-10m/drift?band=10m' });
    const [band] = answer.json().bands;
    const eras = new Set(band.trends.map(({ era }: { era: number }) => era));
    expect(eras.size).toBeGreaterThan(1);
    expect(band.biases.length).toBeGreaterThan(1);
  });

  it('answers for a band that was never swept with no bands', async () => {
    const answer = await club.call({ url: '/v1/antennas/boathouse-2m/drift?band=160m' });
    expect(answer.json().bands).toEqual([]);
  });

  it('has a handheld that shows frequencies 0.3 % too high, and no other instrument that is off', async () => {
    const analyzer = (await club.call({ url: '/v1/analyzers/handheld' })).json();
    const answer = await club.call({ url: '/v1/analyzers/agreement' });
    const over: readonly Bias[] = answer.json().over_antennas;
    const off = over.filter((bias) => bias.off);
    expect(off.map(({ measure }) => measure)).toEqual(['resonance_hz', 'minimum_swr_hz']);
    for (const { analyzer_id, bias } of off) {
      expect(analyzer_id).toBe(analyzer.id);
      // The story: 1.003 times the true frequency.
      expect(bias).toBeCloseTo(0.003, 3);
    }
  });
});
