import type { Config } from './config.ts';
import { sampleFile } from './sample-file.ts';

/** What the first start prints: the token, this once, and a first upload ready to paste. */
export function firstSteps(config: Config, token: string): string {
  const url = config.publicUrl;
  const lines = [
    'This is the first start. Your token, shown only this once (only its SHA-256 is kept):',
    '',
    `  ${token}`,
    '',
    ...(config.demo
      ? ['A demo club is loaded; all of it is invented. A first upload to one of its antennas:', '']
      : ['Add a site and an antenna, then upload a first sweep:', '', ...creation(url, token)]),
    `  printf '${sampleFile.replaceAll('\n', '\\n')}' | curl -sS --data-binary @- \\`,
    `    -H 'Authorization: Bearer ${token}' \\`,
    `    '${url}/v1/antennas/${firstAntenna(config)}/sweeps?file_name=first.s1p'`,
  ];
  return `${lines.join('\n')}\n\n`;
}

function firstAntenna(config: Config): string {
  return config.demo ? 'hilltop-20m' : 'my-antenna';
}

function creation(url: string, token: string): string[] {
  const post = (path: string, body: Record<string, unknown>) => [
    `  curl -sS -H 'Authorization: Bearer ${token}' -H 'Content-Type: application/json' \\`,
    `    -d '${JSON.stringify(body)}' '${url}${path}'`,
  ];
  return [
    ...post('/v1/sites', { key: 'my-site', name: 'My site' }),
    ...post('/v1/antennas', {
      key: 'my-antenna',
      site: 'my-site',
      name: 'My antenna',
      kind: 'dipole',
      design_bands: ['20m'],
      plan: 'iaru-r1',
    }),
  ];
}
