import { removableLine } from '../lines/line-basis.ts';
import { Problem } from '../problems.ts';
import type { ReportBasis } from '../report-basis.ts';
import type { SweepRecord } from '../store/port.ts';

/**
 * The basis at the plane that is asked for; by default that of the sweep. Throws `plane-unavailable`
 * with the reason where the sweep is not known there.
 */
export function atPlane(
  basis: ReportBasis,
  { facts, measured }: SweepRecord,
  plane: ReportBasis['plane'] | undefined,
): ReportBasis {
  if (plane === undefined || plane === facts.plane) return basis;
  if (basis.line === null) {
    throw unavailable(
      'The sweep was taken at the feed point; what the line would make of it there is not its measurement.',
    );
  }
  const line = removableLine(basis.line, measured);
  if (!line.ok) throw unavailable(line.error.detail, line.error.code);
  return { ...basis, plane };
}

function unavailable(detail: string, code?: string): Problem {
  return new Problem('plane-unavailable', {
    detail,
    errors: [{ detail: 'Not known at this plane.', parameter: 'plane' }],
    ...(code === undefined ? {} : { members: { code } }),
  });
}
