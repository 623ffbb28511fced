import type { AntennaBook } from './antenna-book.ts';
import { boathouse2m } from './antennas/boathouse-2m.ts';
import { boathouse10m } from './antennas/boathouse-10m.ts';
import { boathouseBeam } from './antennas/boathouse-beam.ts';
import { boathouseLoop } from './antennas/boathouse-loop.ts';
import { boathouseTrap } from './antennas/boathouse-trap.ts';
import { hilltop20m } from './antennas/hilltop-20m.ts';
import { hilltop40m } from './antennas/hilltop-40m.ts';
import { hilltop80m } from './antennas/hilltop-80m.ts';
import { hilltopOcf } from './antennas/hilltop-ocf.ts';
import { hilltopVertical } from './antennas/hilltop-vertical.ts';
import type { DemoClub, DemoUpload } from './club.ts';
import { instruments } from './instruments.ts';
import { demoLineChecks } from './line-checks.ts';
import { measure } from './measure.ts';
import { demoSites } from './sites.ts';
import type { Visit } from './visit.ts';

const books: readonly AntennaBook[] = [
  hilltop20m,
  hilltop40m,
  hilltop80m,
  hilltopOcf,
  hilltopVertical,
  boathouse10m,
  boathouse2m,
  boathouseBeam,
  boathouseLoop,
  boathouseTrap,
];

/**
 * The invented club with two years of sweeps. Everything in it is made up and says so; the sweeps
 * come from closed-form models through instruments with errors. Each call gives the same bytes.
 */
export function demoClub(): DemoClub {
  return {
    key: 'larkhollow',
    name: 'Larkhollow Radio Club (invented)',
    invented: true,
    sites: demoSites,
    antennas: books.map(({ antenna }) => antenna),
    analyzers: Object.entries(instruments).map(([key, { facts }]) => ({ key, facts })),
    uploads: books
      .flatMap((book) => book.visits.map((visit, number) => uploadOf(book, visit, number)))
      .sort((a, b) => (a.measuredAt < b.measuredAt ? -1 : 1)),
    work: books.flatMap(({ antenna, work = [] }) =>
      work.map((one) => ({ antennaKey: antenna.key, ...one })),
    ),
    lineChecks: demoLineChecks(),
  };
}

function uploadOf(book: AntennaBook, visit: Visit, number: number): DemoUpload {
  const { measuredAt, by, conditions, told } = visit;
  const antennaKey = book.antenna.key;
  const instrument = instruments[by];
  const writeFile = instrument.fileOf(number, measuredAt);
  const title = `Invented for the demo: ${antennaKey}, ${measuredAt}, ${by}`;
  const { extension, ...file } = writeFile(measure(book, visit, instrument), title);
  const stamp = measuredAt.slice(0, 16).replaceAll(':', '');
  return {
    antennaKey,
    analyzerKey: by,
    measuredAt,
    conditions,
    told,
    note: `Invented for the demo. ${visit.note}`.trim(),
    plane: 'measured',
    fileName: `${antennaKey}-${stamp}-${by}${extension}`,
    ...file,
  };
}
