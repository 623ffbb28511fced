import type { DriftSweep, Wetness } from '../../core/record/drift/drift-series.ts';
import type { DriftCode } from '../../core/record/drift/findings.ts';
import { Random } from '../support/random.ts';

/** What goes wrong with a simulated antenna, and the names that are right for it. */
const rightNames = {
  jump: ['sudden_jump'],
  loss: ['loss_growing'],
  drift: ['slow_drift_down', 'slow_drift_up'],
  wet: ['only_when_wet'],
} as const satisfies Record<string, readonly DriftCode[]>;
export type FaultKind = keyof typeof rightNames;

export interface TrueFault {
  readonly kind: FaultKind;
  /** The first sweep after it. */
  readonly firstPlace: number;
  readonly rightNames: readonly DriftCode[];
  /** Sweeps that can show it: all, or the wet ones, from `firstPlace` on. */
  readonly showing: readonly number[];
}

/** One simulated antenna over ten years: what was measured, and what was true. */
export interface SimulatedAntenna {
  readonly sweeps: readonly DriftSweep[];
  readonly fault: TrueFault | null;
}

const dayMs = 24 * 3600 * 1000;
const yearMs = 365.25 * dayMs;
const years = 10;
const kinds = Object.keys(rightNames) as readonly FaultKind[];

/**
 * A station: four antennas tested six times a year by five instruments for ten years; three of them
 * get one fault each, of different kinds. Sizes are invented, in the ranges that each line says.
 */
export function simulatedStation(seed: number, index: number): readonly SimulatedAntenna[] {
  const random = Random.ofCase(seed, index);
  const biases = Array.from({ length: 5 }, () => ({
    frequency: 0.0006 * random.gaussian(),
    swr: 0.015 * random.gaussian(),
    width: 0.02 * random.gaussian(),
  }));
  const spared = random.pick(kinds);
  const chosen = [null, ...kinds.filter((kind) => kind !== spared)];
  return chosen.map((kind) => simulatedAntenna(random, kind, biases));
}

interface Bias {
  readonly frequency: number;
  readonly swr: number;
  readonly width: number;
}

interface Visit {
  readonly atMs: number;
  readonly wetness: Wetness;
  readonly isWet: boolean;
  readonly eraIndex: number;
}

function visitsOf(random: Random): readonly Visit[] {
  const eraStarts = [random.uniform(2.5, 5) * yearMs, random.uniform(5.5, 8) * yearMs];
  return Array.from({ length: years * 6 }, (_, i) => {
    const atMs = ((i + random.uniform(0, 0.9)) * yearMs) / 6;
    const isWet = random.chance(0.25);
    const wetness = random.chance(0.1) ? 'unknown' : isWet ? 'wet' : 'dry';
    return { atMs, isWet, wetness, eraIndex: eraStarts.filter((start) => start <= atMs).length };
  });
}

/** Changes that a fault makes, in the logarithms of frequency, SWR and width. */
interface Change {
  readonly frequency: number;
  readonly swr: number;
  readonly width: number;
}

const none: Change = { frequency: 0, swr: 0, width: 0 };

function sizeOf(kind: FaultKind, random: Random): Change {
  const sign = random.chance(0.5) ? 1 : -1;
  if (kind === 'jump') {
    return { frequency: sign * random.uniform(0.006, 0.03), swr: random.uniform(0, 0.4), width: 0 };
  }
  // Some decibels more in the line: a lower SWR, a wider span.
  if (kind === 'loss') {
    return { frequency: 0, swr: -random.uniform(0.08, 0.25), width: random.uniform(0.12, 0.4) };
  }
  // By year.
  if (kind === 'drift') return { frequency: sign * random.uniform(0.003, 0.01), swr: 0, width: 0 };
  return { frequency: -random.uniform(0.006, 0.02), swr: random.uniform(0.1, 0.4), width: 0 };
}

/** A slow drift counts from where it has moved the resonance by this part. */
const driftOnset = 0.006;

function simulatedAntenna(
  random: Random,
  kind: FaultKind | null,
  biases: readonly Bias[],
): SimulatedAntenna {
  const visits = visitsOf(random);
  const eraStart = (era: number) => visits.findIndex(({ eraIndex }) => eraIndex === era);
  const era = random.integer(0, 2);
  // After a year of the era.
  const from = eraStart(era) + random.integer(6, 8);
  const size = kind === null ? none : sizeOf(kind, random);
  const eraLevels = [0, 1, 2].map(() => ({
    frequency: 0.01 * random.gaussian(),
    swr: 0.1 * random.gaussian(),
    width: 0.1 * random.gaussian(),
  }));
  const season = { frequency: random.uniform(0, 0.001), phase: random.uniform(0, 2 * Math.PI) };
  const usualWet = { frequency: -random.uniform(0, 0.0015), swr: random.uniform(-0.03, 0.03) };
  const hz = random.logUniform(1.8e6, 150e6);
  const partAt = (place: number): number => {
    const { atMs, isWet, eraIndex } = visits[place];
    if (place < from || eraIndex !== era) return 0;
    if (kind === 'drift') return (atMs - visits[from].atMs) / yearMs;
    return kind === 'wet' && !isWet ? 0 : 1;
  };
  const sweeps = visits.map(({ atMs, isWet, wetness, eraIndex }, place): DriftSweep => {
    const who = random.integer(0, biases.length - 1);
    const level = eraLevels[eraIndex];
    const part = partAt(place);
    const year = Math.cos((2 * Math.PI * atMs) / yearMs + season.phase);
    // One in two hundred is wrong for reasons that nobody wrote down.
    const wild = random.chance(0.005) ? 10 : 1;
    const wet = isWet ? 1 : 0;
    const logHz =
      level.frequency +
      biases[who].frequency +
      season.frequency * year +
      usualWet.frequency * wet +
      size.frequency * part +
      0.0006 * wild * random.gaussian();
    const logSwr =
      0.3 +
      level.swr +
      biases[who].swr +
      0.015 * year +
      usualWet.swr * wet +
      size.swr * part +
      0.015 * wild * random.gaussian();
    const logWidth =
      level.width + biases[who].width + 0.01 * year + size.width * part + 0.02 * random.gaussian();
    return {
      sweepId: `sweep ${place}`,
      measuredAtMs: atMs,
      analyzerId: `instrument ${who}`,
      wetness,
      eraIndex,
      resonant: true,
      values: {
        resonance_hz: { value: hz * Math.exp(logHz), u95: 0.0001 * hz },
        minimum_swr_hz: {
          value: hz * Math.exp(logHz + 0.001 * random.gaussian()),
          u95: 0.001 * hz,
        },
        minimum_swr: { value: Math.exp(Math.max(0.02, logSwr)), u95: 0.01 },
        span_width_hz: { value: 0.02 * hz * Math.exp(logWidth), u95: 0.0002 * hz },
      },
    };
  });
  return { sweeps, fault: kind === null ? null : faultOf(kind, visits, from, era, size) };
}

function faultOf(
  kind: FaultKind,
  visits: readonly Visit[],
  from: number,
  era: number,
  size: Change,
): TrueFault {
  const shows = ({ atMs, isWet, eraIndex }: Visit, place: number) => {
    if (place < from || eraIndex !== era) return false;
    if (kind === 'wet') return isWet;
    const moved = (Math.abs(size.frequency) * (atMs - visits[from].atMs)) / yearMs;
    return kind !== 'drift' || moved >= driftOnset;
  };
  const showing = visits.flatMap((visit, place) => (shows(visit, place) ? [place] : []));
  if (showing.length === 0)
    return { kind, firstPlace: from, rightNames: rightNames[kind], showing };
  return { kind, firstPlace: from, rightNames: rightNames[kind], showing };
}
