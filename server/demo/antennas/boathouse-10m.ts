import { type AntennaBook, inventedAntenna, worked } from '../antenna-book.ts';
import { dipoleImpedance } from '../models/induced-emf.ts';
import { isUnderWay, trimmed } from '../stories.ts';
import { dry, wet } from '../visit.ts';

const firstLengthM = 5.16;
const trimmedLengthM = 5.06;

/** A dipole that was cut too long, swept on less than its band. */
export const boathouse10m: AntennaBook = {
  antenna: inventedAntenna('boathouse-10m', 'boathouse', {
    name: '10 m wire dipole',
    kind: 'dipole',
    designBands: ['10m'],
    feedLine: [],
    note: `${trimmed.text} Its sweeps end at 29.2 MHz, below the top of the band.`,
  }),
  range: { lowHz: 27_500_000, highHz: 29_200_000 },
  model: (frequencyHz, { measuredAt }) => {
    const lengthM = isUnderWay(trimmed, measuredAt) ? trimmedLengthM : firstLengthM;
    return dipoleImpedance(frequencyHz, { lengthM, radiusM: 0.002 });
  },
  visits: [
    dry('2025-04-26T10:00:00Z', 'handheld', '14 °C', 'First record: resonates too low.'),
    dry('2025-05-03T14:30:00Z', 'handheld', '16 °C', 'After trimming.'),
    wet('2025-11-08T11:00:00Z', 'logger', '8 °C, drizzle'),
    dry('2026-05-16T11:00:00Z', 'bench', '16 °C', 'Comparison day, first reading.'),
    dry('2026-05-16T11:20:00Z', 'handheld', '16 °C', 'Comparison day, first reading.'),
    dry('2026-05-16T11:40:00Z', 'logger', '16 °C', 'Comparison day, first reading.'),
    dry('2026-05-16T15:00:00Z', 'bench', '18 °C', 'Comparison day, second reading.'),
    dry('2026-05-16T15:20:00Z', 'handheld', '18 °C', 'Comparison day, second reading.'),
    dry('2026-05-16T15:40:00Z', 'logger', '18 °C', 'Comparison day, second reading.'),
    dry('2026-10-31T10:30:00Z', 'bench', '10 °C'),
  ],
  work: [worked('trimmed', '2025-05-03T13:00:00Z', '5 cm off each end.', -0.1)],
};
