import { createHash, randomBytes } from 'node:crypto';
import { join } from 'node:path';
import { defaultReadLimits } from '../../core/formats/read-types.ts';
import { addFirstClub } from '../../server/first-run.ts';
import { makeIdSource } from '../../server/ids.ts';
import { ingest } from '../../server/ingest.ts';
import type { Service } from '../../server/service.ts';
import type { Actor, AntennaRecord, NewSweep, Store } from '../../server/store/port.ts';
import { openSqliteStore } from '../../server/store/sqlite/open.ts';
import { asTouchstone, typicalSweep } from './typical-sweep.ts';

/** Small files: what is measured is how the number of records bears, and a million are to be made. */
const points = 51;
/** Adds under way at once: as many as the writer commits together. */
const together = 256;
const antennasPerClub = 50;
const fullPage = 50;

export interface Filled {
  readonly token: string;
  /** Key of an antenna that has the share of sweeps that each has. */
  readonly antennaKey: string;
  readonly antennas: number;
  readonly sweeps: number;
}

/**
 * Fills a new store through its port, as uploads do, with sweeps of clubs of 50 antennas; the first
 * club's token comes back. Only the analysis is made once and reused: its cost does not depend on how
 * much is stored.
 */
export async function fillStore(
  folder: string,
  { antennas, sweeps }: { readonly antennas: number; readonly sweeps: number },
  progress: (done: number) => void = () => undefined,
): Promise<Filled> {
  const store = await openSqliteStore({ path: join(folder, 'ledger.sqlite') });
  try {
    const service = serviceOver(store);
    const first = await addFirstClub(service, randomBytes, {
      key: 'bench',
      name: 'Bench',
      invented: true,
    });
    if (first === null) throw new Error('The folder holds a club already.');
    const all = await addAntennas(service, first.actor, antennas);
    const made = all.map((one) => templateOf(service, one));
    for (let done = 0; done < sweeps; done += together) {
      const count = Math.min(together, sweeps - done);
      await Promise.all(
        Array.from({ length: count }, (_, i) =>
          store.addSweep(variant(service, templateFor(made, done + i), done + i)),
        ),
      );
      if ((done / together) % 100 === 0) progress(done);
    }
    return { token: first.token, antennaKey: 'a0', antennas, sweeps };
  } finally {
    await store.close();
  }
}

/** The first antenna has a full page however few there are; the rest goes round. */
function templateFor(made: readonly NewSweep[], number: number): NewSweep {
  return made[number < fullPage ? 0 : number % made.length];
}

function serviceOver(store: Store): Service {
  return {
    store,
    now: Date.now,
    newId: makeIdSource(Date.now, randomBytes),
    publicUrl: 'http://127.0.0.1',
    ingest: async (incoming) => ingest(incoming),
    requestLimits: { perAddress: 0, perToken: 0 },
    trustedProxies: [],
    limits: defaultReadLimits,
  };
}

interface Placed {
  readonly actor: Actor;
  readonly antenna: AntennaRecord;
}

async function addAntennas(service: Service, first: Actor, count: number): Promise<Placed[]> {
  const placed: Placed[] = [];
  let actor = first;
  let siteId = '';
  for (let n = 0; n < count; n++) {
    if (n % antennasPerClub === 0) {
      if (n > 0) actor = await addClub(service, n / antennasPerClub);
      siteId = await addSite(service, actor);
    }
    const antenna = await service.store.addEditable('antennas', actor, {
      id: service.newId(),
      key: `a${n % antennasPerClub}`,
      facts: {
        siteId,
        name: 'Bench',
        kind: 'dipole',
        designBands: ['20m'],
        plan: 'iaru-r1',
        licence: null,
        maxSwr: 2,
        referenceOhm: 50,
        feedLine: null,
        note: '',
        invented: true,
      },
    });
    placed.push({ actor, antenna });
  }
  return placed;
}

async function addClub(service: Service, number: number): Promise<Actor> {
  const clubId = service.newId();
  const memberId = service.newId();
  const createdAt = new Date(service.now()).toISOString();
  await service.store.addClub(
    { id: clubId, key: `bench-${number}`, name: 'Bench', invented: true, createdAt },
    {
      id: service.newId(),
      clubId,
      memberId,
      label: 'bench',
      createdAt,
      secretSha256: randomBytes(32),
    },
  );
  return { clubId, memberId, at: createdAt };
}

async function addSite(service: Service, actor: Actor): Promise<string> {
  const { id } = await service.store.addEditable('sites', actor, {
    id: service.newId(),
    key: 'bench',
    facts: {
      name: 'Bench',
      latitudeDeg: null,
      longitudeDeg: null,
      elevationM: null,
      note: '',
      invented: true,
    },
  });
  return id;
}

/** An analysed sweep of an antenna, of which the others are copies with files of their own. */
function templateOf(service: Service, { actor, antenna }: Placed): NewSweep {
  const bytes = Buffer.from(asTouchstone(typicalSweep(points)));
  const made = ingest({
    id: service.newId(),
    clubId: actor.clubId,
    receivedAt: actor.at,
    uploadedBy: actor.memberId,
    antenna,
    analyzer: null,
    ownCables: [],
    facts: {
      antennaId: antenna.id,
      analyzerId: null,
      measuredAt: actor.at,
      conditions: null,
      note: '',
      plane: 'measured',
      invented: true,
    },
    bytes,
    fileSha256: sha256(bytes),
    fileName: 'bench.s1p',
    columns: null,
    port: null,
    limits: service.limits,
  });
  if (!made.ok) throw new Error(made.error.detail);
  return made.value;
}

const hourMs = 3_600_000;
const firstTime = Date.parse('2016-01-01T00:00:00Z');

function variant(service: Service, template: NewSweep, number: number): NewSweep {
  const id = service.newId();
  const file = Buffer.concat([Buffer.from(`! ${number}\r\n`), template.file]);
  const { record, summary, points: kept } = template;
  const measuredAt = new Date(firstTime + (number % 87_600) * hourMs).toISOString();
  const renamed = (json: string) => json.replaceAll(record.id, id);
  return {
    ...template,
    record: {
      ...record,
      id,
      facts: { ...record.facts, measuredAt },
      measured: { ...record.measured, fileSha256: sha256(file), fileBytes: file.length },
    },
    file,
    points: kept,
    summary: {
      ...summary,
      summaryJson: renamed(summary.summaryJson),
      usableJson: renamed(summary.usableJson),
    },
  };
}

function sha256(bytes: Uint8Array): string {
  return createHash('sha256').update(bytes).digest('hex');
}
