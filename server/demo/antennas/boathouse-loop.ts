import { type AntennaBook, inventedAntenna } from '../antenna-book.ts';
import { seriesResonator } from '../models/lumped.ts';
import { seededStream } from '../random.ts';
import { retuned } from '../stories.ts';
import { dry, wet } from '../visit.ts';

/** A small loop with a coupling loop, tuned by hand to somewhere in the band. */
export const boathouseLoop: AntennaBook = {
  antenna: inventedAntenna('boathouse-loop', 'boathouse', {
    name: '20 m small loop',
    kind: 'small_loop',
    designBands: ['20m'],
    feedLine: [],
    note: retuned.text,
  }),
  range: { lowHz: 13_950_000, highHz: 14_400_000 },
  model: (frequencyHz, { measuredAt }) => {
    const tuning = seededStream(`tuning of ${measuredAt}`);
    const resonanceHz = 14_080_000 + 180_000 * tuning.uniform();
    const resistanceOhm = 42 + 14 * tuning.uniform();
    return seriesResonator(frequencyHz, { resistanceOhm, resonanceHz, q: 310 });
  },
  visits: [
    dry('2025-03-22T10:10:00Z', 'bench', 'indoors', 'First record of this antenna.'),
    dry('2025-08-16T11:00:00Z', 'bench', 'indoors'),
    wet('2026-02-07T14:30:00Z', 'bench', '2 °C, on the balcony in sleet'),
    dry('2026-07-18T11:20:00Z', 'bench', 'indoors'),
    dry('2026-11-07T13:00:00Z', 'bench', 'indoors'),
  ],
};
