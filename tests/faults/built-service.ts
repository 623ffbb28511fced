import { type ChildProcess, spawn } from 'node:child_process';
import { once } from 'node:events';
import { createServer } from 'node:net';
import { resonatorFile } from '../support/club-records.ts';

const program = new URL('../../dist/server/main.js', import.meta.url).pathname;

/** The built service as a process of its own. */
export interface BuiltService {
  readonly child: ChildProcess;
  readonly url: string;
  output(): string;
  /** Resolves once it listens; throws if it ends before. */
  readonly listening: Promise<void>;
}

export async function freePort(): Promise<number> {
  const server = createServer().listen(0, '127.0.0.1');
  await once(server, 'listening');
  const address = server.address();
  if (address === null || typeof address === 'string') throw new Error('no port');
  server.close();
  await once(server, 'close');
  return address.port;
}

/** Starts it without a demo; does not wait until it listens. */
export function startService(
  dataDir: string,
  port: number,
  settings: Readonly<Record<string, string>> = {},
): BuiltService {
  const child = spawn(process.execPath, [program], {
    env: {
      PATH: process.env['PATH'],
      PORT: String(port),
      DATA_DIR: dataDir,
      DEMO: 'off',
      BACKUP_EVERY_HOURS: '0',
      REQUESTS_PER_MINUTE_ADDRESS: '0',
      REQUESTS_PER_MINUTE_TOKEN: '0',
      ...settings,
    },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  let output = '';
  const listening = new Promise<void>((resolve, reject) => {
    const take = (chunk: Buffer) => {
      output += chunk;
      if (output.includes('listens on')) resolve();
    };
    child.stdout.on('data', take);
    child.stderr.on('data', take);
    child.once('exit', (code) => reject(new Error(`ended with ${code}: ${output}`)));
  });
  // Who kills it before it listens does not wait for it.
  listening.catch(() => {});
  return { child, url: `http://127.0.0.1:${port}`, output: () => output, listening };
}

/** Sends a signal and waits for the end. */
export async function end({ child }: BuiltService, signal: NodeJS.Signals): Promise<void> {
  if (child.exitCode !== null || child.signalCode !== null) return;
  const ended = once(child, 'exit');
  child.kill(signal);
  await ended;
}

/** The token that a first start printed. */
export function tokenOf(service: BuiltService): string {
  const token = /sl_[0-9A-Za-z]+/.exec(service.output())?.[0];
  if (token === undefined) throw new Error('The first start printed no token.');
  return token;
}

/** Adds a site and an antenna `dipole` to upload to. */
export async function addTestAntenna(url: string, token: string): Promise<void> {
  const headers = { authorization: `Bearer ${token}`, 'content-type': 'application/json' };
  const bodies = {
    '/v1/sites': { key: 'field', name: 'Field' },
    '/v1/antennas': {
      key: 'dipole',
      site: 'field',
      name: 'Dipole',
      kind: 'dipole',
      plan: 'iaru-r1',
    },
  };
  for (const [path, body] of Object.entries(bodies)) {
    const answer = await fetch(url + path, { method: 'POST', headers, body: JSON.stringify(body) });
    if (answer.status !== 201) throw new Error(await answer.text());
  }
}

/** The file of an upload by its number: no two are the same. */
export function numberedFile(number: number): string {
  return resonatorFile({ comment: `upload ${number}` });
}

/** Uploads the numbered file. */
export function uploadNumbered(url: string, token: string, number: number): Promise<Response> {
  return fetch(`${url}/v1/antennas/dipole/sweeps`, {
    method: 'POST',
    headers: { authorization: `Bearer ${token}` },
    body: numberedFile(number),
  });
}
