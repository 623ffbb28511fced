import { findCable } from '../core/line/cables.ts';
import type { DemoClub, DemoLineCheck, DemoUpload } from './demo/club.ts';
import { sha256 } from './http/digests.ts';
import { ingestLineCheck } from './ingest.ts';
import type { Service } from './service.ts';
import type { Actor, AnalyzerRecord, AntennaRecord } from './store/port.ts';

/** Adds the demo club's records to the actor's club, its sweeps by the way of every upload. */
export async function loadDemo(service: Service, actor: Actor, demo: DemoClub): Promise<void> {
  const { store, newId } = service;
  const siteIds = new Map<string, string>();
  for (const { key, facts } of demo.sites) {
    const { id } = await store.addEditable('sites', actor, { id: newId(), key, facts });
    siteIds.set(key, id);
  }
  const analyzers = new Map<string, AnalyzerRecord>();
  for (const { key, facts } of demo.analyzers) {
    const fresh = { id: newId(), key, facts };
    analyzers.set(key, await store.addEditable('analyzers', actor, fresh));
  }
  const antennas = new Map<string, AntennaRecord>();
  for (const { key, siteKey, facts } of demo.antennas) {
    const fresh = { id: newId(), key, facts: { ...facts, siteId: found(siteIds, siteKey) } };
    antennas.set(key, await store.addEditable('antennas', actor, fresh));
  }
  for (const upload of demo.uploads) {
    const antenna = found(antennas, upload.antennaKey);
    const analyzer = found(analyzers, upload.analyzerKey);
    await keepUpload(service, actor, upload, antenna, analyzer);
  }
  for (const { antennaKey, doneAt, facts } of demo.work) {
    const antennaId = found(antennas, antennaKey).id;
    const at = new Date(doneAt).toISOString();
    await store.addWork(actor, { id: newId(), antennaId, doneAt: at, facts });
  }
  for (const check of demo.lineChecks) {
    const antenna = found(antennas, check.antennaKey);
    await keepLineCheck(service, actor, check, antenna, found(analyzers, check.analyzerKey));
  }
}

async function keepUpload(
  service: Service,
  actor: Actor,
  upload: DemoUpload,
  antenna: AntennaRecord,
  analyzer: AnalyzerRecord,
): Promise<void> {
  const { conditions, told, note, plane, bytes, fileName } = upload;
  const measuredAt = new Date(upload.measuredAt).toISOString();
  const made = await service.ingest({
    id: service.newId(),
    clubId: actor.clubId,
    receivedAt: actor.at,
    uploadedBy: actor.memberId,
    antenna,
    analyzer,
    ownCables: [],
    facts: {
      antennaId: antenna.id,
      analyzerId: analyzer.id,
      measuredAt,
      conditions,
      ...told,
      note,
      plane,
      invented: true,
    },
    bytes,
    fileSha256: sha256(bytes).toString('hex'),
    fileName,
    columns: upload.columns ?? null,
    port: upload.port ?? null,
    limits: service.limits,
  });
  if (!made.ok) throw new Error(`The demo file ${fileName} cannot be read: ${made.error.detail}`);
  await service.store.addSweep(made.value);
}

async function keepLineCheck(
  service: Service,
  actor: Actor,
  { tested, note, bytes, fileName, ...check }: DemoLineCheck,
  antenna: AntennaRecord,
  analyzer: AnalyzerRecord,
): Promise<void> {
  const measuredAt = new Date(check.measuredAt).toISOString();
  const made = ingestLineCheck(
    {
      id: service.newId(),
      clubId: actor.clubId,
      receivedAt: actor.at,
      uploadedBy: actor.memberId,
      bytes,
      fileSha256: sha256(bytes).toString('hex'),
      fileName,
      columns: null,
      port: null,
      limits: service.limits,
    },
    { tested, cable: findCable(tested.cable ?? ''), assumptions: [] },
    { antennaId: antenna.id, analyzerId: analyzer.id, measuredAt, note, invented: true },
  );
  if (!made.ok) throw new Error(`The demo line check ${fileName} is refused.`);
  await service.store.addLineCheck(made.value);
}

function found<Value>(map: ReadonlyMap<string, Value>, key: string): Value {
  const value = map.get(key);
  if (value === undefined) throw new Error(`The demo club names \`${key}\` but does not have it.`);
  return value;
}
