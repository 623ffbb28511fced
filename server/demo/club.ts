import type { Conditions } from '../../core/record/conditions.ts';
import type { WorkFacts } from '../store/history-store.ts';
import type { AnalyzerFacts, AntennaFacts, SiteFacts, TestedLine } from '../store/port.ts';

/** The invented club: facts as the store keeps them, and sweeps as files that members would send. */
export interface DemoClub {
  readonly key: string;
  readonly name: string;
  readonly invented: true;
  readonly sites: readonly DemoSite[];
  readonly antennas: readonly DemoAntenna[];
  readonly analyzers: readonly DemoAnalyzer[];
  /** Ascending in time of measurement. */
  readonly uploads: readonly DemoUpload[];
  readonly work: readonly DemoWork[];
  /** Ascending in time of measurement. */
  readonly lineChecks: readonly DemoLineCheck[];
}

export interface DemoSite {
  readonly key: string;
  readonly facts: SiteFacts;
}

export interface DemoAntenna {
  readonly key: string;
  readonly siteKey: string;
  readonly facts: Omit<AntennaFacts, 'siteId'>;
}

export interface DemoAnalyzer {
  readonly key: string;
  readonly facts: AnalyzerFacts;
}

/** One sweep as a member would upload it: the file's bytes and what is told beside it. */
export interface DemoUpload {
  readonly antennaKey: string;
  readonly analyzerKey: string;
  /** RFC 3339, UTC. */
  readonly measuredAt: string;
  readonly conditions: string;
  readonly told: Conditions;
  readonly note: string;
  readonly plane: 'measured';
  readonly fileName: string;
  readonly bytes: Uint8Array;
  /** The column mapping, for delimited text. */
  readonly columns?: string;
  /** The port that the antenna is at, for two-port files. */
  readonly port?: 1 | 2;
}

/** Work on an antenna. */
export interface DemoWork {
  readonly antennaKey: string;
  /** RFC 3339, UTC. */
  readonly doneAt: string;
  readonly facts: WorkFacts;
}

/** One sweep into a feed line, and what is told of the line. */
export interface DemoLineCheck {
  readonly antennaKey: string;
  readonly analyzerKey: string;
  /** RFC 3339, UTC. */
  readonly measuredAt: string;
  readonly note: string;
  readonly fileName: string;
  readonly bytes: Uint8Array;
  readonly tested: TestedLine;
}
