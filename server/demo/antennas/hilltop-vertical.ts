import { type AntennaBook, inventedAntenna } from '../antenna-book.ts';
import { dipoleImpedance } from '../models/induced-emf.ts';
import { wetGround } from '../stories.ts';
import { dry, wet } from '../visit.ts';

const heightM = 10.1;
const groundLossDryOhm = 16;
const groundLossWetOhm = 9;

/** A quarter-wave vertical: half of a dipole of twice its height, and the loss of the ground. */
export const hilltopVertical: AntennaBook = {
  antenna: inventedAntenna('hilltop-vertical', 'hilltop', {
    name: '40 m vertical with radials',
    kind: 'vertical_with_radials',
    designBands: ['40m'],
    feedLine: [],
    note: wetGround.text,
  }),
  range: { lowHz: 6_700_000, highHz: 7_600_000 },
  model: (frequencyHz, { wet: isWet }) => {
    const dipole = dipoleImpedance(frequencyHz, { lengthM: 2 * heightM, radiusM: 0.02 });
    const groundOhm = isWet ? groundLossWetOhm : groundLossDryOhm;
    return { re: dipole.re / 2 + groundOhm, im: dipole.im / 2 };
  },
  visits: [
    dry('2025-03-08T09:10:00Z', 'handheld', '7 °C', 'First record of this antenna.'),
    dry('2025-07-19T10:00:00Z', 'bench', '24 °C, dry for weeks'),
    wet('2025-11-15T09:30:00Z', 'bench', '7 °C, soaked ground'),
    dry('2026-05-16T10:00:00Z', 'bench', '15 °C', 'Comparison day, first reading.'),
    dry('2026-05-16T10:20:00Z', 'handheld', '15 °C', 'Comparison day, first reading.'),
    dry('2026-05-16T10:40:00Z', 'logger', '15 °C', 'Comparison day, first reading.'),
    dry('2026-05-16T14:00:00Z', 'bench', '18 °C', 'Comparison day, second reading.'),
    dry('2026-05-16T14:20:00Z', 'handheld', '18 °C', 'Comparison day, second reading.'),
    dry('2026-05-16T14:40:00Z', 'logger', '18 °C', 'Comparison day, second reading.'),
    wet('2026-10-24T09:15:00Z', 'bench', '9 °C, soaked ground'),
  ],
};
