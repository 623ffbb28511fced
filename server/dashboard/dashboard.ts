import { type BaselineChange, changeSince } from '../../core/record/baseline-change.ts';
import type { BandMeasures } from '../../core/record/measures.ts';
import { baselinesOfEras } from '../history/baselines.ts';
import { dueTests } from '../history/due-tests.ts';
import { measuredEntries } from '../history/measured-rows.ts';
import type { Service } from '../service.ts';
import type { HistoryEntry, Standing } from '../store/history-store.ts';
import type {
  AntennaRecord,
  Editable,
  EditableKind,
  EditableKinds,
  Page,
  PageRequest,
  SiteRecord,
  SweepRecord,
} from '../store/port.ts';
import { antennaState, bandState, type StandingState } from './states.ts';

/** A design band of an antenna by its newest good sweep. */
export interface BandStanding {
  readonly band: string;
  readonly state: StandingState;
  /** Null: no good sweep of the band is among the newest. */
  readonly sweep: SweepRecord | null;
  readonly measures: BandMeasures | null;
  /** The era of the sweep. */
  readonly eraIndex: number | null;
}

export interface AntennaStanding {
  readonly antenna: AntennaRecord;
  readonly state: StandingState;
  /** The newest of all, good or not. */
  readonly latestSweep: SweepRecord | null;
  /** In the order in which the antenna names them. */
  readonly bands: readonly BandStanding[];
}

/** An antenna with what else a member wants to see at a glance. */
export interface AntennaOverview extends AntennaStanding {
  /** Null: it is not tested at an interval. */
  readonly dueAtMs: number | null;
  /** By band, against the baseline of the sweep's era; none where the sweep is part of that. */
  readonly changes: ReadonlyMap<string, BaselineChange>;
}

export interface SiteOverview {
  readonly site: SiteRecord;
  readonly antennas: readonly AntennaOverview[];
}

/** How everything of a club stands: sites and antennas by key. */
export async function dashboardOf(
  service: Service,
  clubId: string,
): Promise<readonly SiteOverview[]> {
  const due = new Map(
    (await dueTests(service, clubId)).map((test) => [test.antenna.id, test.due.dueAtMs]),
  );
  const antennas: AntennaOverview[] = [];
  for (const standing of await antennaStandings(service, clubId)) {
    const dueAtMs = due.get(standing.antenna.id) ?? null;
    antennas.push({ ...standing, dueAtMs, changes: await changesOf(service, standing) });
  }
  const sites = await everyOne(service, 'sites', clubId);
  return sites.map((site) => ({
    site,
    antennas: antennas.filter(({ antenna }) => antenna.facts.siteId === site.id),
  }));
}

/** How each antenna of a club stands, by key. */
export async function antennaStandings(
  service: Service,
  clubId: string,
): Promise<readonly AntennaStanding[]> {
  const standings = new Map<string, Standing[]>();
  for (const standing of await service.store.listStandings(clubId)) {
    const ofAntenna = standings.get(standing.antennaId);
    if (ofAntenna === undefined) standings.set(standing.antennaId, [standing]);
    else ofAntenna.push(standing);
  }
  const all: AntennaStanding[] = [];
  for (const antenna of await everyOne(service, 'antennas', clubId)) {
    all.push(await antennaStanding(service, antenna, standings.get(antenna.id) ?? []));
  }
  return all;
}

async function antennaStanding(
  service: Service,
  antenna: AntennaRecord,
  standings: readonly Standing[],
): Promise<AntennaStanding> {
  // Many bands often stand by one sweep, which is looked at once.
  const entries = new Map<string, HistoryEntry>();
  for (const { band, entry } of standings) if (band !== null) entries.set(entry.record.id, entry);
  const measured = await measuredEntries(service, antenna, [...entries.values()]);
  const bands = antenna.facts.designBands.map((band): BandStanding => {
    const found = standings.find((standing) => standing.band === band);
    const sweep = found?.entry.record ?? null;
    const row = measured.find(({ record }) => record.id === sweep?.id)?.row;
    const measures = row?.measures.bands.find((candidate) => candidate.band === band) ?? null;
    const state = bandState(measures?.sweptFraction ?? 0, measures?.usableFraction ?? 0);
    return { band, state, sweep, measures, eraIndex: row?.eraIndex ?? null };
  });
  const newest = standings.find(({ band }) => band === null);
  return {
    antenna,
    state: antennaState(bands.map(({ state }) => state)),
    latestSweep: newest?.entry.record ?? null,
    bands,
  };
}

async function changesOf(
  service: Service,
  { antenna, bands }: AntennaStanding,
): Promise<ReadonlyMap<string, BaselineChange>> {
  const eras = new Set(bands.flatMap(({ eraIndex }) => eraIndex ?? []));
  const baselines = await baselinesOfEras(service, antenna, eras);
  const changes = new Map<string, BaselineChange>();
  for (const { band, sweep, measures, eraIndex } of bands) {
    const ofEra = baselines.find((baseline) => baseline.eraIndex === eraIndex);
    const baseline = ofEra?.bands.find((candidate) => candidate.band === band);
    if (sweep === null || measures === null || baseline === undefined) continue;
    if (baseline.sweepIds.includes(sweep.id)) continue;
    changes.set(band, changeSince(baseline, measures));
  }
  return changes;
}

const pageSize = 500;

async function everyOne<K extends EditableKind>(
  { store }: Service,
  kind: K,
  clubId: string,
): Promise<readonly Editable<EditableKinds[K]>[]> {
  const all: Editable<EditableKinds[K]>[] = [];
  let after: PageRequest['after'] = null;
  do {
    const request: PageRequest = { limit: pageSize, after };
    const page: Page<Editable<EditableKinds[K]>> = await store.listEditables(kind, clubId, request);
    all.push(...page.items);
    after = page.next;
  } while (after !== null);
  return all;
}
