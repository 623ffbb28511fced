import { findCable } from '../../core/line/cables.ts';
import { agedLine, boathouse2m, newLine } from './antennas/boathouse-2m.ts';
import type { DemoLineCheck } from './club.ts';
import { touchstone1 } from './files/touchstone-file.ts';
import { instruments } from './instruments.ts';
import { measure } from './measure.ts';
import type { GenericCable } from './models/generic-cables.ts';
import { type FeedLine, throughLine } from './models/lumped.ts';
import { dry, type Visit } from './visit.ts';

const open = { re: 1e12, im: 0 };
const range = { lowHz: 1_000_000, highHz: 201_000_000 };

/** The line of the two-metre antenna before and after it was replaced, each with its end open. */
export function demoLineChecks(): readonly DemoLineCheck[] {
  return [
    checkOf(
      dry('2025-09-27T10:35:00Z', 'bench', '15 °C', 'Antenna taken off, end left open.'),
      agedLine,
      'coax-50-pe-10mm',
    ),
    checkOf(
      dry('2025-10-04T15:50:00Z', 'bench', '14 °C', 'The new line before the antenna went on.'),
      newLine,
      'coax-50-foam-10mm',
    ),
  ];
}

function checkOf(visit: Visit, line: FeedLine, cable: GenericCable): DemoLineCheck {
  const { antenna } = boathouse2m;
  const { measuredAt, by } = visit;
  const model = (frequencyHz: number) => throughLine(open, frequencyHz, line);
  const measurement = measure({ antenna, range, model, visits: [visit] }, visit, instruments[by]);
  const title = `Invented for the demo: line of ${antenna.key}, ${measuredAt}, ${by}`;
  const { bytes } = touchstone1('HZ', 'RI')(measurement, title);
  return {
    antennaKey: antenna.key,
    analyzerKey: by,
    measuredAt,
    note: `Invented for the demo. ${visit.note}`,
    fileName: `${antenna.key}-line-${measuredAt.slice(0, 10)}.s1p`,
    bytes,
    tested: {
      farEnd: 'open',
      loadOhm: null,
      cable: findCable(cable)?.id ?? cable,
      lengthM: line.lengthM,
      lengthU95M: 0.1,
      velocityFactor: null,
      velocityFactorU95: null,
      window: 'kaiser_6',
      compensateLoss: true,
    },
  };
}
