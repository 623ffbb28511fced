import { ok, type Result } from '../../result.ts';
import type { Assumption, ReadError } from '../read-types.ts';
import { refuse } from './faults.ts';
import type { Points } from './points.ts';
import type { Sections } from './sections.ts';

/** What the member and the file's name say of the port. */
export interface PortHints {
  /** The port that the antenna is at. */
  readonly port?: 1 | 2;
  /** The name is a hint at the number of ports, checked against the content. */
  readonly fileName?: string;
}

/** Which port of the file is read. */
export interface PortChoice {
  readonly port: 1 | 2;
  readonly assumptions: readonly Assumption[];
}

/** Settles the port; what is assumed of the other one is told. */
export function choosePort(
  points: Points,
  sections: Sections,
  { port, fileName }: PortHints,
): Result<PortChoice, ReadError> {
  const { ports, at22 } = points.layout;
  const line = points.line[0];
  const named = /\.s([12])p$/i.exec(fileName ?? '')?.[1];
  if (ports === 1) {
    if (port === 2) {
      const detail = 'Port 2 was asked for, but the file has one port.';
      return refuse('port_absent', detail, 'Leave `port` out.', { line });
    }
    const detail = 'The name says two ports, but each point has one pair; it was read as one port.';
    const assumptions = named === '2' ? [{ code: 'name_says_two_ports', detail, line }] : [];
    return ok({ port: 1, assumptions });
  }
  if (named === '1' && port === undefined) {
    const detail =
      'The name says one port, 3 numbers a point, but the points have the 9 numbers of two ports.';
    const remedy =
      'If it is a two-port file, say which port the antenna is at: `port=1` or `port=2`.';
    return refuse('ports_differ', detail, remedy, { line });
  }
  if (port === 2 && at22 === null) {
    const detail = 'Port 2 was asked for, but the file holds S11 and S21 alone.';
    return refuse('port_absent', detail, 'Leave `port` out.', { line });
  }
  return chooseOfTwo(points, sections, port, line);
}

function chooseOfTwo(
  points: Points,
  { network, option }: Sections,
  asked: 1 | 2 | undefined,
  line: number,
): Result<PortChoice, ReadError> {
  const port = asked ?? 1;
  const { at11, at12, at21, at22 } = points.layout;
  const [own, other] = port === 1 ? [at11, at22] : [at22, at11];
  const nothing = option.format === 'DB' ? Number.NEGATIVE_INFINITY : 0;
  const isUnmeasured = (offset: number | null) =>
    option.parameter === 'S' &&
    offset !== null &&
    isAlways(nothing, offset, points, network.values);
  const areOthersUnmeasured = [at12, at21, other].every(isUnmeasured);
  if (isUnmeasured(own) && !areOthersUnmeasured) {
    const detail = `S${port}${port} is exactly zero at every point: port ${port} was not measured.`;
    const remedy = `Say \`port=${3 - port}\` if the antenna is there.`;
    return refuse('port_not_measured', detail, remedy, { line });
  }
  const assumptions: Assumption[] = [];
  if (asked === undefined) {
    const detail = 'The file has two ports and none was named: port 1 was taken for the antenna.';
    assumptions.push({ code: 'port_assumed', detail, line });
  }
  if (areOthersUnmeasured) {
    const detail = 'All other entries are exactly zero: they were taken as not measured.';
    assumptions.push({ code: 'others_not_measured', detail, line });
  } else {
    const detail =
      "The reflection is the antenna's only if the other port is closed by its reference; that was assumed.";
    assumptions.push({ code: 'other_port_matched', detail, line });
  }
  return ok({ port, assumptions });
}

/** Whether the magnitude or real part of a pair has one value everywhere, and nothing beside it. */
function isAlways(value: number, offset: number, points: Points, values: Float64Array): boolean {
  for (let i = 0; i < points.count; i++) {
    const at = points.start[i] + offset;
    if (values[at] !== value) return false;
    if (value === 0 && values[at + 1] !== 0) return false;
  }
  return true;
}
