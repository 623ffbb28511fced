import { type ChildProcess, spawn, spawnSync } from 'node:child_process';
import { once } from 'node:events';
import { existsSync, mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs';
import { Agent, request } from 'node:http';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { tokenPattern } from '../../server/auth/token.ts';
import { resonatorFile } from '../support/club-records.ts';

const program = new URL('../../dist/server/main.js', import.meta.url).pathname;

interface Running {
  readonly process: ChildProcess;
  readonly url: string;
  output(): string;
}

async function freePort(): Promise<number> {
  const server = createServer().listen(0, '127.0.0.1');
  await once(server, 'listening');
  const address = server.address();
  if (address === null || typeof address === 'string') throw new Error('no port');
  server.close();
  await once(server, 'close');
  return address.port;
}

/** Starts the built program as an operator would, and waits until it says that it listens. */
async function start(environment: Readonly<Record<string, string>>): Promise<Running> {
  const port = await freePort();
  const child = spawn(process.execPath, [program], {
    env: { PATH: process.env['PATH'], PORT: String(port), ...environment },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  let output = '';
  const listening = new Promise<void>((resolve, reject) => {
    const take = (chunk: Buffer) => {
      output += chunk;
      if (output.includes('listens on')) resolve();
    };
    child.stdout?.on('data', take);
    child.stderr?.on('data', take);
    child.once('exit', (code) => reject(new Error(`exited with ${code}: ${output}`)));
  });
  await listening;
  return { process: child, url: `http://127.0.0.1:${port}`, output: () => output };
}

async function stop({ process: child }: Running): Promise<number | null> {
  if (child.exitCode !== null) return child.exitCode;
  child.kill('SIGTERM');
  const [code] = await once(child, 'exit');
  return code;
}

describe('the program', () => {
  const folder = mkdtempSync(join(tmpdir(), 'sweep-ledger-process-'));
  const settings = { DATA_DIR: folder, DEMO: 'off', CLUB_NAME: 'Process test' };
  let running: Running;
  let token: string;

  beforeAll(async () => {
    expect(existsSync(program)).toBe(true);
    running = await start(settings);
    token = /sl_[0-9A-Za-z]+/.exec(running.output())?.[0] ?? '';
  });
  afterAll(async () => {
    await stop(running);
    rmSync(folder, { recursive: true, force: true });
  });

  const headers = () => ({ authorization: `Bearer ${token}` });
  const addAntenna = async () => {
    const json = { ...headers(), 'content-type': 'application/json' };
    const post = (path: string, body: object) =>
      fetch(running.url + path, { method: 'POST', headers: json, body: JSON.stringify(body) });
    expect((await post('/v1/sites', { key: 'a', name: 'A' })).status).toBe(201);
    const antenna = { key: 'b', site: 'a', name: 'B', kind: 'dipole', plan: 'iaru-r1' };
    expect((await post('/v1/antennas', antenna)).status).toBe(201);
  };

  it('shows the token at its first start, once', () => {
    expect(token).toMatch(tokenPattern);
    expect(running.output().match(/This is the first start/g)).toHaveLength(1);
    expect(running.output()).toContain('curl -sS --data-binary @-');
  });

  it('keeps no file that holds the token', () => {
    const files = readdirSync(folder, { recursive: true, withFileTypes: true });
    const kept = files.filter((file) => file.isFile());
    expect(kept.length).toBeGreaterThan(0);
    for (const file of kept) {
      expect(readFileSync(join(file.parentPath, file.name)).includes(token)).toBe(false);
    }
  });

  it('takes an upload over real HTTP', async () => {
    await addAntenna();
    const answer = await fetch(`${running.url}/v1/antennas/b/sweeps?file_name=a.s1p`, {
      method: 'POST',
      headers: headers(),
      body: resonatorFile(),
    });
    expect(answer.status).toBe(201);
    const { id, summary } = (await answer.json()) as { id: string; summary: { phase: string } };
    expect(summary.phase).toBe('signed');
    const read = await fetch(`${running.url}/v1/sweeps/${id}/file`, { headers: headers() });
    expect(await read.text()).toBe(resonatorFile());
  });

  it('answers a body beyond the limit with 413 before it has arrived', async () => {
    const answer = request(`${running.url}/v1/antennas/b/sweeps`, {
      method: 'POST',
      headers: { ...headers(), 'content-length': 17 * 1024 * 1024 },
    });
    answer.on('error', () => {});
    answer.flushHeaders();
    const [response] = await once(answer, 'response');
    expect(response.statusCode).toBe(413);
    answer.destroy();
  });

  it('ends on SIGTERM while keep-alive connections are open, with all that it took', async () => {
    const agent = new Agent({ keepAlive: true });
    const opened = Array.from({ length: 5 }, () => get(`${running.url}/livez`, agent));
    expect(await Promise.all(opened)).toEqual([200, 200, 200, 200, 200]);
    const file = resonatorFile({ comment: 'the last one' });
    const last = await fetch(`${running.url}/v1/antennas/b/sweeps`, {
      method: 'POST',
      headers: headers(),
      body: file,
    });
    expect(last.status).toBe(201);
    expect(await stop(running)).toBe(0);
    agent.destroy();
    expect(running.output()).toContain('"msg":"closed"');
    const log = running.output().match(/^\{.*$/gm) ?? [];
    expect(log.length).toBeGreaterThan(5);
    expect(log.join()).not.toContain(token);

    running = await start(settings);
    expect(running.output()).not.toContain('This is the first start');
    const list = await fetch(`${running.url}/v1/antennas/b/sweeps`, { headers: headers() });
    const { items } = (await list.json()) as { items: unknown[] };
    expect(items).toHaveLength(2);
  });
});

describe('a request that never completes', () => {
  it('does not keep the program from ending at its deadline', async () => {
    const folder = mkdtempSync(join(tmpdir(), 'sweep-ledger-deadline-'));
    const running = await start({ DATA_DIR: folder, DEMO: 'off', SHUTDOWN_SECONDS: '1' });
    const token = /sl_[0-9A-Za-z]+/.exec(running.output())?.[0];
    const hanging = request(`${running.url}/v1/antennas/none/sweeps`, {
      method: 'POST',
      headers: { authorization: `Bearer ${token}`, 'content-length': 100 },
    });
    const cut = once(hanging, 'error');
    hanging.write('a part of the body');
    expect((await fetch(`${running.url}/livez`)).status).toBe(200);
    expect(await stop(running)).toBe(0);
    await cut;
    rmSync(folder, { recursive: true, force: true });
  });
});

const hasCurl = spawnSync('curl', ['--version']).status === 0;

describe.skipIf(!hasCurl)('the commands that a first start prints', () => {
  it.each(['on', 'off'])('lead to a first record when they are pasted (DEMO=%s)', async (demo) => {
    const folder = mkdtempSync(join(tmpdir(), 'sweep-ledger-first-'));
    const running = await start({ DATA_DIR: folder, DEMO: demo });
    const [printed] = running.output().split('Sweep Ledger listens on');
    const commands = printed.slice(printed.indexOf('\n\n  ', printed.indexOf('sl_')));
    const { stdout } = spawnSync('bash', ['-ec', commands], { encoding: 'utf8' });
    expect(stdout).toContain('"minimum_swr":{');
    expect(stdout).toContain('"file":{"sha256":');
    expect(await stop(running)).toBe(0);
    rmSync(folder, { recursive: true, force: true });
  });
});

describe('the program with a configuration that it cannot use', () => {
  it('says what is wrong and does not start', async () => {
    await expect(start({ DEMO: 'perhaps' })).rejects.toThrow(/exited with 1: .*DEMO/s);
  });
});

function get(url: string, agent: Agent): Promise<number | undefined> {
  return new Promise((resolve, reject) => {
    request(url, { agent }, (response) => {
      response.resume();
      response.on('end', () => resolve(response.statusCode));
    })
      .on('error', reject)
      .end();
  });
}
