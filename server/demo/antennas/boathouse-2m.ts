import { type AntennaBook, inventedAntenna, worked } from '../antenna-book.ts';
import { genericLine, statedLine } from '../models/generic-cables.ts';
import { seriesResonator, throughLine } from '../models/lumped.ts';
import { isUnderWay, lineReplaced } from '../stories.ts';
import { dry, wet } from '../visit.ts';

const groundPlane = { resistanceOhm: 33, resonanceHz: 145_300_000, q: 8 };
export const agedLine = genericLine('coax-50-pe-10mm', 22, 2.4);
export const newLine = genericLine('coax-50-foam-10mm', 22);

/** A ground plane behind a line that had gone bad. */
export const boathouse2m: AntennaBook = {
  antenna: inventedAntenna('boathouse-2m', 'boathouse', {
    name: '2 m ground plane',
    kind: 'vertical',
    designBands: ['2m'],
    feedLine: [statedLine('coax-50-foam-10mm', 22)],
    note: lineReplaced.text,
  }),
  range: { lowHz: 140_000_000, highHz: 150_000_000 },
  model: (frequencyHz, { measuredAt }) => {
    const line = isUnderWay(lineReplaced, measuredAt) ? newLine : agedLine;
    return throughLine(seriesResonator(frequencyHz, groundPlane), frequencyHz, line);
  },
  visits: [
    dry('2025-01-25T14:10:00Z', 'logger', '1 °C', 'First record of this antenna.'),
    dry('2025-06-14T10:20:00Z', 'logger', '18 °C'),
    dry('2025-09-27T09:50:00Z', 'bench', '15 °C', 'Signals had grown weak; SWR looks fine.'),
    dry('2025-10-04T16:30:00Z', 'bench', '14 °C', 'With the new line.'),
    dry('2026-04-18T11:40:00Z', 'logger', '13 °C'),
    wet('2026-11-07T12:10:00Z', 'logger', '7 °C, fog'),
  ],
  work: [worked('line_replaced', '2025-10-04T15:30:00Z', 'The old line had aged.')],
};
