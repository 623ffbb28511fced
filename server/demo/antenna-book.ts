import type { AntennaFacts } from '../store/port.ts';
import type { DemoAntenna } from './club.ts';
import type { AntennaModel, SweepRange, Visit } from './visit.ts';

/** One invented antenna: what the record says, what physics says, and when it was measured. */
export interface AntennaBook {
  readonly antenna: DemoAntenna;
  readonly model: AntennaModel;
  readonly range: SweepRange;
  readonly visits: readonly Visit[];
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
