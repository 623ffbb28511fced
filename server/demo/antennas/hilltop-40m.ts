import { type AntennaBook, inventedAntenna } from '../antenna-book.ts';
import { genericLine, statedLine } from '../models/generic-cables.ts';
import { dipoleImpedance } from '../models/induced-emf.ts';
import { throughLine } from '../models/lumped.ts';
import { slowDrift } from '../stories.ts';
import { dry, wet } from '../visit.ts';

const newLengthM = 20.45;
const stretchPerYear = 0.003;
const line = genericLine('coax-50-pe-10mm', 14);

/** A half-wave wire that stretches. */
export const hilltop40m: AntennaBook = {
  antenna: inventedAntenna('hilltop-40m', 'hilltop', {
    name: '40 m wire dipole',
    kind: 'dipole',
    designBands: ['40m'],
    feedLine: [statedLine('coax-50-pe-10mm', 14)],
    note: slowDrift.text,
  }),
  range: { lowHz: 6_800_000, highHz: 7_400_000 },
  model: (frequencyHz, { years }) => {
    const lengthM = newLengthM * (1 + stretchPerYear * years);
    const antenna = dipoleImpedance(frequencyHz, { lengthM, radiusM: 0.001 });
    return throughLine(antenna, frequencyHz, line);
  },
  visits: [
    dry('2024-12-14T12:10:00Z', 'bench', '3 °C', 'First record of this antenna.'),
    wet('2025-03-08T10:30:00Z', 'bench', '7 °C, rain'),
    dry('2025-06-21T09:20:00Z', 'bench', '19 °C'),
    dry('2025-09-20T14:00:00Z', 'bench', '17 °C'),
    dry('2025-12-13T11:30:00Z', 'bench', '1 °C'),
    dry('2026-03-14T10:00:00Z', 'bench', '8 °C'),
    dry('2026-05-16T09:00:00Z', 'bench', '15 °C', 'Comparison day, first reading.'),
    dry('2026-05-16T09:20:00Z', 'handheld', '15 °C', 'Comparison day, first reading.'),
    dry('2026-05-16T09:40:00Z', 'logger', '15 °C', 'Comparison day, first reading.'),
    dry('2026-05-16T13:00:00Z', 'bench', '18 °C', 'Comparison day, second reading.'),
    dry('2026-05-16T13:20:00Z', 'handheld', '18 °C', 'Comparison day, second reading.'),
    dry('2026-05-16T13:40:00Z', 'logger', '18 °C', 'Comparison day, second reading.'),
    dry('2026-08-22T10:45:00Z', 'bench', '22 °C'),
    dry('2026-11-14T11:00:00Z', 'bench', '6 °C'),
  ],
};
