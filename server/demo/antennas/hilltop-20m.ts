import { type AntennaBook, inventedAntenna } from '../antenna-book.ts';
import { dipoleImpedance } from '../models/induced-emf.ts';
import { coil, inParallel, inSeries } from '../models/lumped.ts';
import { minimumApart } from '../stories.ts';
import { dry, wet } from '../visit.ts';

const wire = { lengthM: 5.7, radiusM: 0.0008 };
const loadingH = 8.15e-6;
const matchingH = 0.562e-6;

/** A short dipole, loaded to resonance a little high, with a coil across its feed. */
export const hilltop20m: AntennaBook = {
  antenna: inventedAntenna('hilltop-20m', 'hilltop', {
    name: '20 m short loaded dipole',
    kind: 'loaded_dipole',
    designBands: ['20m'],
    feedLine: [],
    note: minimumApart.text,
  }),
  range: { lowHz: 13_800_000, highHz: 14_500_000 },
  model: (frequencyHz) => {
    const loaded = inSeries(dipoleImpedance(frequencyHz, wire), coil(frequencyHz, loadingH, 175));
    return inParallel(loaded, coil(frequencyHz, matchingH, 400));
  },
  visits: [
    dry('2024-12-14T11:05:00Z', 'bench', '3 °C', 'First record of this antenna.'),
    dry('2025-04-12T09:40:00Z', 'handheld', '11 °C'),
    dry('2025-09-20T13:15:00Z', 'bench', '17 °C'),
    wet('2026-02-21T10:20:00Z', 'logger', '5 °C, drizzle'),
    dry('2026-06-13T12:00:00Z', 'handheld', '21 °C'),
    dry('2026-10-24T10:10:00Z', 'bench', '9 °C'),
  ],
};
