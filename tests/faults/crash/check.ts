import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';
import Database from 'better-sqlite3';
import { uploadNumbered } from '../built-service.ts';

/** A line of the client's ledger. */
export interface Acknowledged {
  readonly number: number;
  readonly id: string;
  readonly sha256: string;
}

/** The whole lines of the client's ledger. */
export function readLedger(path: string): readonly Acknowledged[] {
  return readFileSync(path, 'utf8')
    .split('\n')
    .slice(0, -1)
    .map((line) => line.split(' '))
    .map(([number, id, sha256]) => ({ number: Number(number), id, sha256 }));
}

/** Does it for all, eight at a time. */
async function eachOf<Item>(
  items: readonly Item[],
  act: (item: Item) => Promise<void>,
): Promise<void> {
  const waiting = items.values();
  const work = async () => {
    for (const item of waiting) await act(item);
  };
  await Promise.all(Array.from({ length: 8 }, work));
}

/** What of the acknowledged uploads the service does not give back as it was sent, in words. */
export async function lostUploads(
  url: string,
  token: string,
  acknowledged: readonly Acknowledged[],
): Promise<readonly string[]> {
  const headers = { authorization: `Bearer ${token}` };
  const lost: string[] = [];
  await eachOf(acknowledged, async ({ number, id, sha256 }) => {
    const answer = await fetch(`${url}/v1/sweeps/${id}/file`, { headers });
    const bytes = Buffer.from(await answer.arrayBuffer());
    const found = createHash('sha256').update(bytes).digest('hex');
    if (answer.status !== 200) lost.push(`upload ${number}: ${answer.status}`);
    else if (found !== sha256) lost.push(`upload ${number}: another SHA-256`);
  });
  return lost.sort();
}

/** Which acknowledged uploads, sent again, are not answered with their first record, in words. */
export async function doubledUploads(
  url: string,
  token: string,
  acknowledged: readonly Acknowledged[],
): Promise<readonly string[]> {
  const doubled: string[] = [];
  await eachOf(acknowledged, async ({ number, id }) => {
    const answer = await uploadNumbered(url, token, number);
    const body = (await answer.json()) as { id: string };
    if (answer.status !== 200 || body.id !== id) {
      doubled.push(`upload ${number}: ${answer.status} ${body.id} for ${id}`);
    }
  });
  return doubled.sort();
}

// A sweep is whole with its file, facts, current row, summary, points and event.
const half = `
  SELECT sweep.id FROM sweep
  LEFT JOIN file ON file.club_id = sweep.club_id AND file.sha256 = sweep.file_sha256
  LEFT JOIN sweep_facts ON sweep_facts.club_id = sweep.club_id AND sweep_facts.sweep_id = sweep.id
  LEFT JOIN sweep_current ON sweep_current.club_id = sweep.club_id AND sweep_current.sweep_id = sweep.id
  LEFT JOIN summary ON summary.club_id = sweep.club_id AND summary.sweep_id = sweep.id
  LEFT JOIN event ON event.kind = 'sweep_added' AND event.subject_id = sweep.id
  WHERE file.sha256 IS NULL OR sweep_facts.sweep_id IS NULL OR sweep_current.sweep_id IS NULL
    OR summary.sweep_id IS NULL OR event.seq IS NULL OR length(sweep.points) = 0`;
const lone = `
  SELECT hex(sha256) FROM file WHERE NOT EXISTS
    (SELECT 1 FROM sweep WHERE sweep.club_id = file.club_id AND sweep.file_sha256 = file.sha256)`;

/** What is wrong with the database file as such, in words. */
export function databaseFaults(path: string): readonly string[] {
  const hand = new Database(path, { readonly: true });
  try {
    const integrity: unknown = hand.pragma('integrity_check', { simple: true });
    const orphans = hand.prepare('SELECT count(*) FROM pragma_foreign_key_check').pluck().get();
    return [
      ...(integrity === 'ok' ? [] : [`integrity: ${integrity}`]),
      ...(orphans === 0 ? [] : [`${orphans} rows without parents`]),
      ...hand
        .prepare(half)
        .pluck()
        .all()
        .map((id) => `half a sweep: ${id}`),
      ...hand
        .prepare(lone)
        .pluck()
        .all()
        .map((sha256) => `a file of no sweep: ${sha256}`),
    ];
  } finally {
    hand.close();
  }
}

/** How many sweeps the database holds. */
export function sweepsIn(path: string): number {
  const hand = new Database(path, { readonly: true });
  const count = Number(hand.prepare('SELECT count(*) FROM sweep').pluck().get());
  hand.close();
  return count;
}
