import { spawnSync } from 'node:child_process';
import { closeSync, openSync, rmSync, statfsSync, writeSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { temporaryFolders } from '../support/temporary-folders.ts';
import {
  addTestAntenna,
  type BuiltService,
  end,
  freePort,
  startService,
  tokenOf,
  uploadNumbered,
} from './built-service.ts';

const mebibyte = 1024 * 1024;
const { newFolder, removeAll } = temporaryFolders();
const disk = newFolder();
const mounted = spawnSync('mount', ['-t', 'tmpfs', '-o', 'size=24m,mode=700', 'none', disk], {
  encoding: 'utf8',
});
const isMounted = mounted.status === 0;
if (!isMounted) {
  const why = mounted.error?.message ?? mounted.stderr;
  console.warn(`Full disks are not tested, a small file system cannot be mounted: ${why}`);
}
afterAll(() => {
  if (isMounted) spawnSync('umount', [disk]);
  removeAll();
});

const ballast = join(disk, 'ballast');

function freeBytes(): number {
  const { bavail, bsize } = statfsSync(disk);
  return bavail * bsize;
}

/** Writes a file until the disk has no more than this free. */
function fillUpTo(bytesLeft: number): void {
  const handle = openSync(ballast, 'a');
  try {
    while (freeBytes() > bytesLeft) {
      writeSync(handle, Buffer.alloc(Math.min(mebibyte, freeBytes() - bytesLeft)));
    }
  } finally {
    closeSync(handle);
  }
}

describe.skipIf(!isMounted)('a service on a disk that fills', () => {
  async function startWith(reserveBytes: number) {
    const dataDir = join(disk, `data-${reserveBytes}`);
    const settings = { DISK_RESERVE_BYTES: String(reserveBytes) };
    const service = startService(dataDir, await freePort(), settings);
    await service.listening;
    const token = tokenOf(service);
    await addTestAntenna(service.url, token);
    const stop = async () => {
      await end(service, 'SIGTERM');
      rmSync(ballast, { force: true });
      rmSync(dataDir, { recursive: true });
    };
    return { service, token, stop };
  }

  async function firstSweep(service: BuiltService, token: string): Promise<string> {
    const answer = await uploadNumbered(service.url, token, 1);
    expect(answer.status).toBe(201);
    return ((await answer.json()) as { id: string }).id;
  }

  async function expectRefused(answer: Response): Promise<void> {
    expect(answer.status).toBe(507);
    expect(answer.headers.get('content-type')).toBe('application/problem+json');
    expect(await answer.json()).toMatchObject({ status: 507, title: 'The storage is full' });
  }

  async function expectReads({ url }: BuiltService, token: string, id: string): Promise<void> {
    const headers = { authorization: `Bearer ${token}` };
    for (const path of ['', '/file', '/summary']) {
      const answer = await fetch(`${url}/v1/sweeps/${id}${path}`, { headers });
      expect(answer.status, path).toBe(200);
      await answer.arrayBuffer();
    }
  }

  it('refuses uploads within its reserve, while it can still write, and takes them after', async () => {
    const { service, token, stop } = await startWith(8 * mebibyte);
    const id = await firstSweep(service, token);
    fillUpTo(7 * mebibyte);
    await expectRefused(await uploadNumbered(service.url, token, 2));
    await expectReads(service, token, id);
    // What is kept already needs no room, and what is no upload has the reserve.
    expect((await uploadNumbered(service.url, token, 1)).status).toBe(200);
    const site = await fetch(`${service.url}/v1/sites`, {
      method: 'POST',
      headers: { authorization: `Bearer ${token}`, 'content-type': 'application/json' },
      body: JSON.stringify({ key: 'hill', name: 'Hill' }),
    });
    expect(site.status).toBe(201);
    rmSync(ballast);
    expect((await uploadNumbered(service.url, token, 2)).status).toBe(201);
    await stop();
  });

  it('without a reserve takes them there, which is how the reserve is known to work', async () => {
    const { service, token, stop } = await startWith(0);
    await firstSweep(service, token);
    fillUpTo(7 * mebibyte);
    expect((await uploadNumbered(service.url, token, 2)).status).toBe(201);
    await stop();
  });

  it('with no byte left refuses uploads, goes on reading, and recovers without a restart', async () => {
    const { service, token, stop } = await startWith(0);
    const id = await firstSweep(service, token);
    fillUpTo(0);
    // The log of writes is reused only from its end, so the first one that has no room is refused.
    let answer = await uploadNumbered(service.url, token, 2);
    let last = 2;
    while (answer.status === 201 && last < 100) {
      last += 1;
      answer = await uploadNumbered(service.url, token, last);
    }
    await expectRefused(answer);
    await expectReads(service, token, id);
    expect((await fetch(`${service.url}/livez`)).status).toBe(200);
    rmSync(ballast);
    const again = await uploadNumbered(service.url, token, last);
    expect(again.status).toBe(201);
    const { id: kept } = (await again.json()) as { id: string };
    await expectReads(service, token, kept);
    await stop();
  });
});
