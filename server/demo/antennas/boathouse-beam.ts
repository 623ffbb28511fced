import { type AntennaBook, inventedAntenna, worked } from '../antenna-book.ts';
import { genericLine, statedLine } from '../models/generic-cables.ts';
import { inParallel, seriesResonator, throughLine } from '../models/lumped.ts';
import { isUnderWay, suddenFault } from '../stories.ts';
import { dry, wet } from '../visit.ts';

const sound = { resistanceOhm: 25, resonanceHz: 21_950_000, q: 16 };
const bent = { resistanceOhm: 43, resonanceHz: 22_350_000, q: 9.5 };
const hairpinOhmPerHz = 50 / 21_200_000;
const line = genericLine('coax-50-foam-10mm', 24);

/** The low resistance of a beam's driven element, brought to 50 ohm by a hairpin. */
export const boathouseBeam: AntennaBook = {
  antenna: inventedAntenna('boathouse-beam', 'boathouse', {
    name: '15 m three-element beam',
    kind: 'beam',
    designBands: ['15m'],
    feedLine: [{ ...statedLine('coax-50-foam-10mm', 24), choke: true }],
    note: suddenFault.text,
  }),
  range: { lowHz: 20_700_000, highHz: 21_800_000 },
  model: (frequencyHz, { measuredAt }) => {
    const circuit = isUnderWay(suddenFault, measuredAt) ? bent : sound;
    const driven = seriesResonator(frequencyHz, circuit);
    const hairpin = { re: 0.2, im: hairpinOhmPerHz * frequencyHz };
    return throughLine(inParallel(driven, hairpin), frequencyHz, line);
  },
  visits: [
    dry('2025-01-25T13:00:00Z', 'bench', '1 °C', 'First record of this antenna.'),
    dry('2025-05-03T10:00:00Z', 'logger', '13 °C'),
    dry('2025-08-16T09:30:00Z', 'bench', '20 °C'),
    dry('2025-12-06T11:15:00Z', 'logger', '4 °C'),
    wet('2026-01-24T12:40:00Z', 'handheld', '3 °C, wind', 'After the storm: something is wrong.'),
    dry('2026-02-07T13:30:00Z', 'bench', '2 °C', 'Confirms the change; repair planned.'),
    dry('2026-04-11T15:50:00Z', 'bench', '12 °C', 'After straightening and a new joint.'),
    dry('2026-07-18T10:30:00Z', 'logger', '23 °C'),
    dry('2026-11-07T11:00:00Z', 'bench', '7 °C'),
  ],
  work: [
    worked('inspected', '2026-01-24T12:00:00Z', 'Bent driven element seen from below.'),
    worked('repaired', '2026-04-11T14:00:00Z', 'Driven element straightened, joint made anew.'),
  ],
};
