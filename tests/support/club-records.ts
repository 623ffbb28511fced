import type { TestApp } from './test-app.ts';

/** Adds a site and an antenna by the routes that members use; returns the antenna's body. */
export async function addAntenna(
  { call }: TestApp,
  facts: Readonly<Record<string, unknown>> = {},
): Promise<Record<string, unknown>> {
  const site = await call({ url: '/v1/sites/field' });
  if (site.statusCode === 404) {
    await call({ method: 'POST', url: '/v1/sites', payload: { key: 'field', name: 'Field' } });
  }
  const payload = {
    key: 'field-20m',
    site: 'field',
    name: 'Field dipole',
    kind: 'dipole',
    design_bands: ['20m'],
    plan: 'iaru-r1',
    ...facts,
  };
  const answer = await call({ method: 'POST', url: '/v1/antennas', payload });
  if (answer.statusCode !== 201) throw new Error(answer.body);
  return answer.json();
}

/** Uploads a file as the raw body. */
export function upload(
  { call }: TestApp,
  file: string | Buffer,
  query = '',
  headers: Readonly<Record<string, string>> = {},
) {
  return call({
    method: 'POST',
    url: `/v1/antennas/field-20m/sweeps${query}`,
    payload: file,
    headers: { 'content-type': 'application/octet-stream', ...headers },
  });
}

/**
 * A Touchstone file of a series resonator at 50 ohm: X = slope (f - resonance), R as given. Its SWR
 * is lowest at the resonance, and equals max(R/50, 50/R) there.
 */
export function resonatorFile({
  resonanceHz = 14_175_000,
  resistanceOhm = 60,
  slopeOhmPerHz = 4e-4,
  lowHz = 13_900_000,
  highHz = 14_450_000,
  points = 111,
  comment = 'a resonator',
} = {}): string {
  const rows = Array.from({ length: points }, (_, i) => {
    const hz = Math.round(lowHz + ((highHz - lowHz) * i) / (points - 1));
    const x = slopeOhmPerHz * (hz - resonanceHz);
    const r = resistanceOhm;
    const denominator = (r + 50) ** 2 + x ** 2;
    const re = ((r - 50) * (r + 50) + x * x) / denominator;
    const im = (100 * x) / denominator;
    return `${hz} ${re} ${im}`;
  });
  return `! ${comment}\n# HZ S RI R 50\n${rows.join('\n')}\n`;
}
