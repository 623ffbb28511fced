import { afterEach, describe, expect, it } from 'vitest';
import { defaultReadLimits } from '../../core/formats/read-types.ts';
import { type Incoming, ingest } from '../../server/ingest.ts';
import { IngestPool } from '../../server/ingest-pool.ts';
import { resonatorFile } from '../support/club-records.ts';
import { antennaFacts, at, idOf } from '../support/store-records.ts';

const pools: IngestPool[] = [];
afterEach(() => Promise.all(pools.splice(0).map((pool) => pool.close())));

function poolOf(threads: number): IngestPool {
  const pool = new IngestPool(threads);
  pools.push(pool);
  return pool;
}

function incomingOf(file: string, number = 1): Incoming {
  return {
    id: idOf(number),
    clubId: idOf(900),
    receivedAt: at,
    uploadedBy: idOf(901),
    bytes: Buffer.from(file),
    fileSha256: 'ab'.repeat(32),
    fileName: null,
    columns: null,
    port: null,
    limits: defaultReadLimits,
    antenna: {
      id: idOf(902),
      clubId: idOf(900),
      key: 'a',
      revision: 1,
      createdAt: at,
      updatedAt: at,
      facts: antennaFacts(idOf(903)),
    },
    analyzer: null,
    ownCables: [],
    facts: {
      antennaId: idOf(902),
      analyzerId: null,
      measuredAt: null,
      conditions: null,
      note: '',
      plane: 'measured',
      invented: false,
    },
  };
}

describe('a file that is read in a thread', () => {
  it('gives what it gives where it stands, bit for bit, with the file itself', async () => {
    const incoming = incomingOf(resonatorFile());
    const inThread = await poolOf(1).ingest(incoming);
    const here = ingest(incoming);
    if (!inThread.ok || !here.ok) throw new Error('It was not read.');
    expect(inThread.value).toEqual(here.value);
    expect(inThread.value.file).toBe(incoming.bytes);
  });

  it('is refused with the same error', async () => {
    const incoming = incomingOf('# HZ S RI R 50\n1 0 0\n2 0\n');
    const inThread = await poolOf(1).ingest(incoming);
    expect(inThread.ok).toBe(false);
    expect(inThread).toEqual(ingest(incoming));
  });

  it('comes back to who sent it, however many are under way', async () => {
    const pool = poolOf(2);
    const numbers = Array.from({ length: 20 }, (_, i) => i + 1);
    const made = await Promise.all(
      numbers.map((n) => pool.ingest(incomingOf(resonatorFile({ points: 20 + n }), n))),
    );
    const told = made.map(
      (one) => one.ok && [one.value.record.id, one.value.record.measured.points],
    );
    expect(told).toEqual(numbers.map((n) => [idOf(n), 20 + n]));
  });
});

describe('a thread that fails', () => {
  it('fails the file, and the next file is read', async () => {
    const pool = poolOf(1);
    const broken = { ...incomingOf(resonatorFile()), antenna: null } as unknown as Incoming;
    await expect(pool.ingest(broken)).rejects.toThrow(/facts/);
    expect((await pool.ingest(incomingOf(resonatorFile()))).ok).toBe(true);
  });

  it('that ends fails what is under way', async () => {
    const pool = poolOf(1);
    const under = pool.ingest(incomingOf(resonatorFile()));
    const failed = expect(under).rejects.toThrow(/ended/);
    await pool.close();
    await failed;
  });
});
