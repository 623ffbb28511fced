import { type ChildProcess, spawn } from 'node:child_process';
import { once } from 'node:events';
import { createServer } from 'node:net';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

/** Those of `npm start`. */
const nodeOptions = ['--max-semi-space-size=4'];

/** A server in a process of its own. */
export interface ServerProcess {
  readonly url: string;
  readonly headers: Readonly<Record<string, string>>;
  readonly pid: number;
  stop(): Promise<void>;
}

/** Our service, built, on an empty store in a folder, with one antenna `bench`. */
export async function startService(folder: string): Promise<ServerProcess> {
  const { service, output } = await run(join(folder, 'service'));
  const headers = { authorization: `Bearer ${/sl_[0-9A-Za-z]+/.exec(output)?.[0] ?? ''}` };
  await post(service.url, headers, '/v1/sites', { key: 'bench', name: 'Bench' });
  const facts = { name: 'Bench', kind: 'dipole', design_bands: ['20m'], plan: 'iaru-r1' };
  await post(service.url, headers, '/v1/antennas', { key: 'bench', site: 'bench', ...facts });
  return { ...service, headers };
}

/** Our service, built, on a store that is there; ready to answer when this resolves. */
export async function serviceOn(folder: string, token: string): Promise<ServerProcess> {
  const { service } = await run(folder);
  return { ...service, headers: { authorization: `Bearer ${token}` } };
}

async function run(dataDir: string): Promise<{ service: ServerProcess; output: string }> {
  const port = await freePort();
  const program = fileURLToPath(new URL('../../dist/server/main.js', import.meta.url));
  const child = spawn(process.execPath, [...nodeOptions, program], {
    env: {
      ...process.env,
      PORT: String(port),
      DATA_DIR: dataDir,
      DEMO: 'off',
      BACKUP_EVERY_HOURS: '0',
      // Counted, but never too many.
      REQUESTS_PER_MINUTE_ADDRESS: '10000000',
      REQUESTS_PER_MINUTE_TOKEN: '10000000',
      LOG_LEVEL: 'silent',
    },
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  const output = await firstOutput(child, /listens on/);
  return {
    service: {
      url: `http://127.0.0.1:${port}`,
      headers: {},
      pid: child.pid ?? 0,
      stop: () => stop(child),
    },
    output,
  };
}

/** The floor: keeps bytes, sends `constant`. */
export async function startFloor(folder: string, constant: string): Promise<ServerProcess> {
  const program = fileURLToPath(new URL('./floor-server.ts', import.meta.url));
  const file = join(folder, 'floor.sqlite');
  const child = spawn(process.execPath, ['--import', 'tsx', program, file, constant], {
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  const url = (await firstOutput(child, /http:\S+/)).trim();
  return { url, headers: {}, pid: child.pid ?? 0, stop: () => stop(child) };
}

async function post(url: string, headers: object, path: string, body: object): Promise<void> {
  const answer = await fetch(url + path, {
    method: 'POST',
    headers: { ...headers, 'content-type': 'application/json' },
    body: JSON.stringify(body),
  });
  if (answer.status !== 201) throw new Error(await answer.text());
}

async function firstOutput(child: ChildProcess, awaited: RegExp): Promise<string> {
  let output = '';
  child.stdout?.setEncoding('utf8');
  while (!awaited.test(output)) {
    const [chunk] = await Promise.race([
      once(child.stdout ?? child, 'data'),
      once(child, 'exit').then(() => {
        throw new Error(`The server ended: ${output}`);
      }),
    ]);
    output += chunk;
  }
  return output;
}

async function stop(child: ChildProcess): Promise<void> {
  child.kill('SIGTERM');
  if (child.exitCode === null) await once(child, 'exit');
}

async function freePort(): Promise<number> {
  const server = createServer().listen(0, '127.0.0.1');
  await once(server, 'listening');
  const address = server.address();
  if (address === null || typeof address === 'string') throw new Error('There is no free port.');
  server.close();
  await once(server, 'close');
  return address.port;
}
