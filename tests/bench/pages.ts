import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { Figure } from './measure.ts';
import { type ServerProcess, startService } from './service-process.ts';
import { asTouchstone, typicalSweep } from './typical-sweep.ts';

const antennas = 50;
const sweepPoints = 101;

/** What the board of a club with fifty antennas weighs: the page with its script and its style. */
export async function pageFigures(): Promise<readonly Figure[]> {
  const folder = mkdtempSync(join(tmpdir(), 'sweep-ledger-bench-'));
  const service = await startService(folder);
  try {
    for (let i = 1; i < antennas; i++) await addAntenna(service, i);
    const bytes = await boardBytes(service);
    return [
      {
        key: 'board_page_kb',
        value: bytes / 1000,
        aim: '<= 150',
        unit: 'kB',
        detail: `${antennas} antennas, with script and style, uncompressed`,
      },
    ];
  } finally {
    await service.stop();
    rmSync(folder, { recursive: true, force: true });
  }
}

async function addAntenna({ url, headers }: ServerProcess, i: number): Promise<void> {
  const facts = { kind: 'dipole', design_bands: ['20m', '15m'], plan: 'iaru-r1', site: 'bench' };
  const added = await fetch(`${url}/v1/antennas`, {
    method: 'POST',
    headers: { ...headers, 'content-type': 'application/json' },
    body: JSON.stringify({ key: `bench-${i}`, name: `Antenna number ${i}`, ...facts }),
  });
  const kept = await fetch(`${url}/v1/antennas/bench-${i}/sweeps`, {
    method: 'POST',
    headers,
    body: asTouchstone(typicalSweep(sweepPoints, i)),
  });
  if (!added.ok || !kept.ok) throw new Error(await kept.text());
}

async function boardBytes({ url, headers }: ServerProcess): Promise<number> {
  const token = headers['authorization'].slice('Bearer '.length);
  const board = await textOf(`${url}/`, { cookie: `sweep-ledger-token=${token}` });
  const rows = board.match(/<tr role="row"><th scope="row"/g)?.length ?? 0;
  if (rows !== antennas) throw new Error(`The board shows ${rows} antennas.`);
  const assets = board.match(/\/assets\/[0-9a-f]+\/pages\.(css|js)/g) ?? [];
  if (assets.length !== 2) throw new Error('The board names other files than expected.');
  const texts = await Promise.all(assets.map((path) => textOf(url + path)));
  return [board, ...texts].reduce((sum, text) => sum + Buffer.byteLength(text), 0);
}

async function textOf(url: string, headers: Record<string, string> = {}): Promise<string> {
  const answer = await fetch(url, { headers });
  if (!answer.ok) throw new Error(`${url} answers ${answer.status}.`);
  return answer.text();
}
