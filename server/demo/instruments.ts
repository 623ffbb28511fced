import type { AnalyzerFacts } from '../store/port.ts';
import {
  resistanceReactanceText,
  resistanceUnsignedText,
  swrText,
} from './files/delimited-file.ts';
import { jsonFile } from './files/json-file.ts';
import type { WriteSweepFile } from './files/sweep-file.ts';
import { touchstone1, touchstone1TwoPort, touchstone2 } from './files/touchstone-file.ts';
import type { Complex } from './models/lumped.ts';
import { readsHigh } from './stories.ts';
import type { DemoAnalyzerKey, SweepRange } from './visit.ts';

/** An invented analyzer: how wrong it is, how fine it sweeps and what files it writes. */
export interface Instrument {
  readonly facts: AnalyzerFacts;
  readonly errors: InstrumentErrors;
  points(range: SweepRange): number;
  /** The kind of file of the n-th visit to one antenna; instruments get new firmware at times. */
  fileOf(visitNumber: number, measuredAt: string): WriteSweepFile;
}

export interface InstrumentErrors {
  /** Shown frequency / true frequency. */
  readonly frequencyScale: number;
  readonly directivity: Complex;
  readonly tracking: Complex;
  /** Standard deviation of each part of the reflection, point by point. */
  readonly noise: number;
}

/** Since then the handheld tells the sign of a reactance and the logger the whole reflection. */
const newFirmware = '2025-07-01T00:00:00Z';
/** A sweep over more than half an octave spans several bands. */
const wideRatio = Math.SQRT2;

const benchFiles: readonly WriteSweepFile[] = [
  touchstone1('HZ', 'RI'),
  touchstone1('MHZ', 'MA'),
  touchstone1('KHZ', 'DB'),
  touchstone2('MHZ', 'RI'),
  touchstone1TwoPort('MHZ', 'MA'),
];

function inventedFacts(
  name: string,
  note: string,
  residualErrors: AnalyzerFacts['residualErrors'] = null,
): AnalyzerFacts {
  return {
    name: `${name} (invented)`,
    residualErrors,
    note: `Invented for the demo. ${note}`,
    invented: true,
  };
}

export const instruments: Readonly<Record<DemoAnalyzerKey, Instrument>> = {
  bench: {
    facts: inventedFacts('Bench analyzer', 'Two ports, checked with a load before each day.', {
      directivityDb: 46,
      sourceMatchDb: 40,
      trackingDb: 0.05,
    }),
    errors: {
      frequencyScale: 1,
      directivity: { re: 0.002, im: -0.001 },
      tracking: { re: 1.001, im: 0 },
      noise: 0.0004,
    },
    points: ({ lowHz, highHz }) => (highHz > lowHz * wideRatio ? 801 : 401),
    fileOf: (visitNumber) => benchFiles[visitNumber % benchFiles.length],
  },
  handheld: {
    facts: inventedFacts('Field handheld', readsHigh.text),
    errors: {
      frequencyScale: 1.003,
      directivity: { re: 0.004, im: 0.003 },
      tracking: { re: 1.003, im: 0 },
      noise: 0.002,
    },
    points: () => 101,
    fileOf: (_, measuredAt) =>
      measuredAt < newFirmware ? resistanceUnsignedText : resistanceReactanceText,
  },
  logger: {
    facts: inventedFacts('Boathouse logger', 'Sweeps by itself and sends what it measured.'),
    errors: {
      frequencyScale: 1.00005,
      directivity: { re: -0.003, im: 0.004 },
      tracking: { re: 0.998, im: 0 },
      noise: 0.001,
    },
    points: () => 201,
    fileOf: (_, measuredAt) => (measuredAt < newFirmware ? swrText : jsonFile),
  },
};
