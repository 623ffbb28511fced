import { createHash } from 'node:crypto';
import type { SweepMeasures } from '../../core/record/measures.ts';
import type {
  Actor,
  AnalyzerFacts,
  AntennaFacts,
  CableFacts,
  NewLineCheck,
  NewSweep,
  SiteFacts,
} from '../../server/store/port.ts';

/** Records as the store takes them, for tests of the store itself. */

export const at = '2026-06-01T12:00:00.000Z';

/** An id that sorts as its number does. */
export function idOf(number: number): string {
  return `01970000-0000-7000-8000-${String(number).padStart(12, '0')}`;
}

export function actorOf(clubId: string): Actor {
  return { clubId, memberId: idOf(900), at };
}

export const siteFacts: SiteFacts = {
  name: 'Field',
  latitudeDeg: null,
  longitudeDeg: null,
  elevationM: 120,
  note: '',
  invented: true,
};

export const analyzerFacts: AnalyzerFacts = {
  name: 'Bench unit',
  residualErrors: null,
  note: '',
  invented: true,
};

export function antennaFacts(siteId: string): AntennaFacts {
  return {
    siteId,
    name: 'Dipole',
    kind: 'dipole',
    designBands: ['20m'],
    plan: 'itu-r1',
    licence: null,
    maxSwr: 2,
    referenceOhm: 50,
    feedLine: null,
    note: '',
    invented: true,
  };
}

export const cableFacts: CableFacts = {
  name: 'Own coax',
  characteristicOhm: 50,
  characteristicU95Ohm: null,
  velocityFactor: 0.8,
  velocityFactorU95: 0.01,
  points: [{ frequencyHz: 1e7, lossDbPer100M: 2 }],
  lossU95Fraction: null,
  source: 'its sheet',
  note: '',
  invented: true,
};

/** A line check whose file holds the text. */
export function newLineCheck(
  clubId: string,
  id: string,
  antennaId: string,
  text: string,
): NewLineCheck {
  const { record, file } = newSweep(clubId, id, antennaId, text);
  const { receivedAt, uploadedBy, measured } = record;
  return {
    record: {
      id,
      clubId,
      receivedAt,
      uploadedBy,
      tested: {
        farEnd: 'open',
        loadOhm: null,
        cable: 'own',
        lengthM: 22,
        lengthU95M: null,
        velocityFactor: null,
        velocityFactorU95: null,
        window: 'kaiser_6',
        compensateLoss: true,
      },
      facts: { antennaId, analyzerId: null, measuredAt: null, note: '', invented: true },
      measured,
      reportJson: '{"length_m":22}',
    },
    file,
    traceJson: '{"magnitude":[0,1]}',
  };
}

/** What a sweep of the 20 m band measured. */
const measures: SweepMeasures = {
  analysisVersion: '1',
  plane: 'measured',
  phase: 'signed',
  referenceOhm: 50,
  maxSwr: 2,
  bands: [
    {
      band: '20m',
      sweptFraction: 0.5,
      usableFraction: 0.25,
      resonances: [],
      minimum: null,
      span: null,
      flags: [],
    },
  ],
};

/** A sweep of three points whose file holds the text. */
export function newSweep(clubId: string, id: string, antennaId: string, text: string): NewSweep {
  const file = new TextEncoder().encode(text);
  return {
    record: {
      id,
      clubId,
      receivedAt: at,
      uploadedBy: idOf(900),
      revision: 1,
      facts: {
        antennaId,
        analyzerId: null,
        measuredAt: null,
        conditions: null,
        note: '',
        plane: 'measured',
        invented: true,
      },
      measured: {
        fileSha256: createHash('sha256').update(file).digest('hex'),
        fileBytes: file.length,
        fileName: 'a.s1p',
        format: 'touchstone-1',
        columns: null,
        port: null,
        phase: 'signed',
        referenceOhm: 50,
        points: 3,
        lowHz: 14e6,
        highHz: 14.2e6,
        assumptionsJson: '[]',
      },
    },
    file,
    points: {
      frequencyHz: Float64Array.of(14e6, 14.1e6, 14.2e6),
      reflectionRe: Float64Array.of(0.1, -0.25, 1 / 3),
      reflectionIm: Float64Array.of(-0.5, 0, 0.123456),
      reflectionMagnitude: null,
    },
    summary: { analysisVersion: '1', summaryJson: '{"a":1}', usableJson: '{"b":2}' },
    measures: { basis: 'made for tests', measures },
  };
}
