import type { WorkKind } from '../../core/record/work.ts';
import type { AntennaFacts } from '../store/port.ts';
import type { DemoAntenna, DemoWork } from './club.ts';
import type { AntennaModel, SweepRange, Visit } from './visit.ts';

/** One invented antenna: what the record says, what physics says, and when it was measured. */
export interface AntennaBook {
  readonly antenna: DemoAntenna;
  readonly model: AntennaModel;
  readonly range: SweepRange;
  readonly visits: readonly Visit[];
  readonly work?: readonly BookedWork[];
}

/** Work as it stands in an antenna's book. */
export type BookedWork = Omit<DemoWork, 'antennaKey'>;

/** Work of the invented club; nobody is named. */
export function worked(
  kind: WorkKind,
  doneAt: string,
  note: string,
  lengthChangeM: number | null = null,
): BookedWork {
  const invented = `Invented for the demo. ${note}`;
  return { doneAt, facts: { kind, lengthChangeM, doneBy: null, note: invented, invented: true } };
}

/** What each antenna states of its own; the rest is alike for the whole club. */
type OwnFacts = Pick<AntennaFacts, 'name' | 'kind' | 'designBands' | 'feedLine' | 'note'> &
  Partial<Pick<AntennaFacts, 'maxSwr' | 'plan'>>;

export function inventedAntenna(
  key: string,
  siteKey: string,
  { name, note, ...own }: OwnFacts,
): DemoAntenna {
  const facts = {
    plan: 'iaru-r1',
    licence: null,
    maxSwr: 2,
    referenceOhm: 50,
    ...own,
    name: `${name} (invented)`,
    note: `Invented for the demo. ${note}`,
    invented: true,
  };
  return { key, siteKey, facts };
}
