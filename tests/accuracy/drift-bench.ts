import { type DriftReport, driftOf } from '../../core/record/drift/drift.ts';
import type { BenchReport } from './figure.ts';
import { type FaultKind, type SimulatedAntenna, simulatedStation } from './stations.ts';

interface AntennaScore {
  readonly antennaYears: number;
  readonly falseAlarms: readonly string[];
  /** Null where no fault could be found: none, or fewer than three sweeps show it. */
  readonly fault: {
    readonly kind: FaultKind;
    readonly found: boolean;
    readonly namedRight: boolean;
    readonly names: readonly string[];
  } | null;
}

/** Judges an antenna after every one of its sweeps, as a service that is asked each time would. */
function scoreAntenna({ sweeps, fault }: SimulatedAntenna): AntennaScore {
  const opened = new Set<string>();
  const falseAlarms: string[] = [];
  // Without a fault, or after it, only what stands beside it is a false alarm.
  const faultEra = fault === null ? -1 : sweeps[fault.firstPlace].eraIndex;
  const third = fault?.showing.at(2);
  let found: readonly string[] = [];
  for (let last = 2; last < sweeps.length; last++) {
    const { findings } = driftOf(sweeps.slice(0, last + 1));
    const isFaulty = fault !== null && last >= fault.firstPlace;
    for (const { code, eraIndex } of findings) {
      if (isFaulty && eraIndex === faultEra && code !== 'instrument_off') continue;
      const name = `${code} in era ${eraIndex}`;
      if (!opened.has(name)) falseAlarms.push(code);
      opened.add(name);
    }
    if (last === third) found = ofEra(findings, faultEra);
  }
  const antennaYears = sweeps.length / 6;
  if (fault === null || third === undefined) return { antennaYears, falseAlarms, fault: null };
  const { kind, rightNames } = fault;
  const namedRight = found.length > 0 && rightNames.some((name) => name === found[0]);
  return {
    antennaYears,
    falseAlarms,
    fault: { kind, found: found.length > 0, namedRight, names: found },
  };
}

function ofEra(findings: DriftReport['findings'], era: number): readonly string[] {
  return findings
    .filter(({ code, eraIndex }) => eraIndex === era && code !== 'instrument_off')
    .map(({ code }) => code);
}

export interface DriftPlan {
  readonly seed: number;
  readonly stations: number;
}

/** Figures of the findings over simulated stations; see `simulatedStation` for what these are. */
export function driftBench({ seed, stations }: DriftPlan): BenchReport {
  const scores = Array.from({ length: stations }, (_, i) => simulatedStation(seed, i))
    .flat()
    .map(scoreAntenna);
  const antennaYears = scores.reduce((sum, score) => sum + score.antennaYears, 0);
  const alarms = scores.flatMap(({ falseAlarms }) => falseAlarms);
  const faults = scores.flatMap(({ fault }) => fault ?? []);
  const found = faults.filter((fault) => fault.found);
  const named = found.filter((fault) => fault.namedRight);
  const rate = alarms.length / antennaYears;
  const foundPart = found.length / faults.length;
  const namedPart = named.length / found.length;
  const byKind = [...new Set(faults.map(({ kind }) => kind))].map(
    (kind) => [kind, faults.filter((fault) => fault.kind === kind)] as const,
  );
  return {
    drift_false_alarms_per_antenna_year: {
      value: rate,
      aim: '<= 0.05',
      met: rate <= 0.05,
      detail: { antenna_years: antennaYears, alarms: counts(alarms), seed, stations },
    },
    fault_found_within_3_tests: {
      value: foundPart,
      aim: '>= 0.95',
      met: foundPart >= 0.95,
      detail: Object.fromEntries(
        byKind.map(([kind, own]) => [
          kind,
          { faults: own.length, found: own.filter((fault) => fault.found).length },
        ]),
      ),
    },
    fault_named_right: {
      value: namedPart,
      aim: '>= 0.9',
      met: namedPart >= 0.9,
      detail: Object.fromEntries(
        byKind.map(([kind, own]) => [kind, counts(own.map(({ names }) => names[0] ?? 'nothing'))]),
      ),
    },
  };
}

function counts(names: readonly string[]): Record<string, number> {
  const found: Record<string, number> = {};
  for (const name of names) found[name] = (found[name] ?? 0) + 1;
  return found;
}
