import { type AntennaBook, inventedAntenna } from '../antenna-book.ts';
import { genericLine, statedLine } from '../models/generic-cables.ts';
import { throughLine } from '../models/lumped.ts';
import { trapDipoleImpedance } from '../models/trap-dipole.ts';
import { dry, wet } from '../visit.ts';

const dipole = {
  innerM: 5.11,
  outerM: 4.13,
  trap: { resistanceOhm: 30_000, resonanceHz: 14_150_000, q: 120 },
};
const line = genericLine('coax-50-pe-5mm', 12);

/** A dipole for two bands. */
export const boathouseTrap: AntennaBook = {
  antenna: inventedAntenna('boathouse-trap', 'boathouse', {
    name: '40 and 20 m trap dipole',
    kind: 'trap_dipole',
    designBands: ['40m', '20m'],
    feedLine: [statedLine('coax-50-pe-5mm', 12)],
    note: 'One trap in each arm; a full sweep shows both bands.',
  }),
  range: { lowHz: 6_500_000, highHz: 15_000_000 },
  model: (frequencyHz) => throughLine(trapDipoleImpedance(frequencyHz, dipole), frequencyHz, line),
  visits: [
    dry('2025-02-22T10:00:00Z', 'bench', '5 °C', 'First record of this antenna.'),
    dry('2025-07-19T13:30:00Z', 'bench', '24 °C'),
    wet('2025-12-06T12:00:00Z', 'bench', '4 °C, fog'),
    dry('2026-04-18T10:30:00Z', 'bench', '13 °C'),
    dry('2026-09-26T11:45:00Z', 'bench', '16 °C'),
  ],
};
