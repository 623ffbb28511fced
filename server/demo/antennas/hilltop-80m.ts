import { type AntennaBook, inventedAntenna } from '../antenna-book.ts';
import { genericLine, statedLine } from '../models/generic-cables.ts';
import { dipoleImpedance } from '../models/induced-emf.ts';
import { coil, inSeries, throughLine } from '../models/lumped.ts';
import { dry, wet } from '../visit.ts';

const wire = { lengthM: 24, radiusM: 0.001 };
const loadingH = 32.4e-6;
/** Loss in ground and surroundings of a low wire, seen at the feed, ohm. */
const surroundings = { re: 16, im: 0 };
const line = genericLine('coax-50-pe-10mm', 18);

/** A loaded dipole of a third of the full size: usable on a part of its band only. */
export const hilltop80m: AntennaBook = {
  antenna: inventedAntenna('hilltop-80m', 'hilltop', {
    name: '80 m loaded dipole',
    kind: 'loaded_dipole',
    designBands: ['80m'],
    feedLine: [statedLine('coax-50-pe-10mm', 18)],
    note: 'Two coils in 24 m of wire; narrow, and usable on a part of the band only.',
  }),
  range: { lowHz: 3_400_000, highHz: 3_900_000 },
  model: (frequencyHz) => {
    const wireAndCoils = inSeries(
      dipoleImpedance(frequencyHz, wire),
      coil(frequencyHz, loadingH, 180),
    );
    return throughLine(inSeries(wireAndCoils, surroundings), frequencyHz, line);
  },
  visits: [
    dry('2025-01-18T10:15:00Z', 'bench', '2 °C', 'First record of this antenna.'),
    dry('2025-05-17T11:20:00Z', 'handheld', '14 °C'),
    wet('2025-10-18T10:50:00Z', 'bench', '10 °C, after rain'),
    dry('2026-03-14T10:40:00Z', 'bench', '8 °C'),
    dry('2026-09-12T15:05:00Z', 'handheld', '18 °C'),
  ],
};
