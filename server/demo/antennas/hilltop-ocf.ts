import { type AntennaBook, inventedAntenna } from '../antenna-book.ts';
import { genericLine, statedLine } from '../models/generic-cables.ts';
import { capacitor, inParallel, throughLine } from '../models/lumped.ts';
import { offCentreImpedance } from '../models/off-centre-dipole.ts';
import { isUnderWay, wetOnly } from '../stories.ts';
import { dry, wet } from '../visit.ts';

const wire = { lengthM: 20.6, radiusM: 0.001 };
const transformerRatio = 4;
const line = genericLine('coax-50-foam-10mm', 16);

/** A wire fed at a third of its length through a transformer whose box leaks. */
export const hilltopOcf: AntennaBook = {
  antenna: inventedAntenna('hilltop-ocf', 'hilltop', {
    name: 'Off-centre-fed wire',
    kind: 'off_centre_fed',
    designBands: ['40m', '20m', '10m'],
    maxSwr: 3,
    feedLine: [{ ...statedLine('coax-50-foam-10mm', 16), choke: true }],
    note: wetOnly.text,
  }),
  range: { lowHz: 6_500_000, highHz: 30_500_000 },
  model: (frequencyHz, { wet: isWet, measuredAt }) => {
    const atWire = offCentreImpedance(frequencyHz, wire, 1 / 3);
    const dryBox = { re: atWire.re / transformerRatio, im: atWire.im / transformerRatio };
    if (!isWet || !isUnderWay(wetOnly, measuredAt)) return throughLine(dryBox, frequencyHz, line);
    const water = inParallel({ re: 140, im: 0 }, capacitor(frequencyHz, 90e-12));
    return throughLine(inParallel(dryBox, water), frequencyHz, line);
  },
  visits: [
    dry('2025-02-15T11:00:00Z', 'bench', '4 °C', 'First record of this antenna.'),
    wet('2025-05-17T10:05:00Z', 'bench', '12 °C, steady rain', 'No change in rain.'),
    wet('2025-10-18T10:05:00Z', 'bench', '10 °C, rain', 'SWR differs from the last record.'),
    dry('2025-11-15T12:30:00Z', 'bench', '8 °C', 'As it was in spring.'),
    wet('2026-02-21T11:00:00Z', 'bench', '5 °C, drizzle'),
    dry('2026-06-13T10:30:00Z', 'bench', '21 °C'),
    wet('2026-11-14T12:20:00Z', 'bench', '6 °C, rain'),
  ],
};
