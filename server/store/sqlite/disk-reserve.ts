import { statfs } from 'node:fs/promises';
import { dirname } from 'node:path';
import { StoreError } from '../port.ts';

/**
 * Throws `full` while the disk of the file has fewer bytes free than the reserve: the rest is for
 * what must go on, such as corrections, checkpoints and the log of writes.
 */
export async function refuseBelowReserve(path: string, reserveBytes: number): Promise<void> {
  if (reserveBytes === 0) return;
  const { bavail, bsize } = await statfs(dirname(path));
  if (bavail * bsize >= reserveBytes) return;
  throw new StoreError('full', `The disk has less than ${reserveBytes} bytes free.`);
}
