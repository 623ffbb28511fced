import { uploadNumbered } from '../built-service.ts';

export interface Load {
  /** Requests so far, by status. */
  readonly byStatus: Readonly<Record<number, number>>;
  /** Ends it and waits for what is under way. */
  stop(): Promise<void>;
}

/** Of a hundred requests this many upload a new file; the others read or send a file again. */
const uploadsOfHundred = 2;

const readPaths = [
  '/v1/antennas/dipole/sweeps?limit=20',
  '/v1/antennas/dipole/history?limit=20',
  '/v1/antennas/dipole',
  '/v1/antennas/missing',
  '/v1/dashboard',
  '/v1/due',
  '/metrics',
];
const sweepParts = ['', '/summary', '/points', '/usable', '/chart.svg', '/file'];

/** Asks the service from four clients without a pause: uploads, files sent again, reads, charts. */
export function startLoad(url: string, token: string): Load {
  const byStatus: Record<number, number> = {};
  const headers = { authorization: `Bearer ${token}` };
  let isOver = false;
  let turn = 0;
  let uploaded = 0;
  let lastSweep: string | null = null;

  const send = async (number: number) => {
    const answer = await uploadNumbered(url, token, number);
    const body = (await answer.json()) as { id?: string };
    lastSweep = body.id ?? lastSweep;
    return answer.status;
  };
  const read = async (path: string) => {
    const answer = await fetch(url + path, { headers });
    await answer.arrayBuffer();
    return answer.status;
  };
  const ask = (number: number) => {
    if (number % 100 < uploadsOfHundred || lastSweep === null) return send(uploaded++);
    if (number % 10 === 5) return send(Math.max(0, uploaded - 1));
    const parts = sweepParts.map((part) => `/v1/sweeps/${lastSweep}${part}`);
    const paths = [...readPaths, ...parts];
    return read(paths[number % paths.length]);
  };
  const client = async () => {
    while (!isOver) {
      const status = await ask(turn++);
      byStatus[status] = (byStatus[status] ?? 0) + 1;
    }
  };
  const clients = Array.from({ length: 4 }, client);
  return {
    byStatus,
    stop: async () => {
      isOver = true;
      await Promise.all(clients);
    },
  };
}
