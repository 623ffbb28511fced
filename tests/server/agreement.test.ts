import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { addAntenna, resonatorFile, upload } from '../support/club-records.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

const url = '/v1/analyzers/agreement';
let club: TestApp;
beforeAll(async () => {
  club = await makeTestApp();
  await addAntenna(club);
  for (const key of ['first', 'second', 'high']) {
    await club.call({ method: 'POST', url: '/v1/analyzers', payload: { key, name: key } });
  }
});
afterAll(() => club.close());

describe('the agreement of a club’s instruments', () => {
  it('is empty before two of them met', async () => {
    expect((await club.call({ url })).json()).toEqual({
      items: [],
      on_loads: null,
      over_antennas: [],
    });
  });

  it('tells by how much one of three shows frequencies too high', async () => {
    const scales = { first: 1, second: 1.0001, high: 1.006 };
    for (let month = 1; month <= 4; month++) {
      for (const [hour, [key, scale]] of Object.entries(scales).entries()) {
        const resonanceHz = (14_100_000 + 5000 * month) * scale;
        const file = resonatorFile({ resonanceHz, comment: `${key} in month ${month}` });
        const at = `2026-0${month}-10T1${hour}:00:00Z`;
        const query = `?measured_at=${at}&analyzer=${key}&weather=dry`;
        expect((await upload(club, file, query)).statusCode).toBe(201);
      }
    }
    const { items } = (await club.call({ url })).json();
    const resonance = items.find(({ measure }: { measure: string }) => measure === 'resonance_hz');
    expect(resonance.occasions).toBe(4);
    const biases = resonance.instruments.map(({ bias }: { bias: number }) => bias);
    // ln 1.006 and ln 1.0001, from the mean of all three.
    const mean = (Math.log(1.006) + Math.log(1.0001)) / 3;
    expect(Math.max(...biases)).toBeCloseTo(Math.log(1.006) - mean, 4);
    expect(resonance.grubbs.critical_5_percent).toBeCloseTo(1.154, 3);
    const worth = resonance.instruments.filter(
      ({ correction_worth }: { correction_worth: boolean }) => correction_worth,
    );
    expect(worth.length).toBeGreaterThan(0);
  });

  it('tells by how much one of three shows a load’s resistance too high', async () => {
    const reflections = { first: 0, second: 0.001, high: 0.06 };
    for (const [key, reflection] of Object.entries(reflections)) {
      for (const again of ['10:00', '11:00']) {
        const answer = await club.call({
          method: 'POST',
          url: `/v1/analyzers/${key}/load-checks?load=50&measured_at=2026-05-10T${again}:00Z&file_name=load.s1p`,
          payload: `# MHz S RI R 50\n! ${key} ${again}\n3.5 ${reflection} 0\n14 ${reflection} 0\n28 ${reflection} 0\n`,
          headers: { 'content-type': 'application/octet-stream' },
        });
        expect(answer.statusCode).toBe(201);
      }
    }
    const { on_loads } = (await club.call({ url })).json();
    expect(on_loads).toMatchObject({ measure: 'resistance_ohm', occasions: 1 });
    const biases = on_loads.instruments.map(({ bias }: { bias: number }) => bias);
    // R = 50 (1 + Γ) / (1 - Γ).
    const spread = Math.log(1.06 / 0.94);
    expect(Math.max(...biases) - Math.min(...biases)).toBeCloseTo(spread, 5);
  });
});
