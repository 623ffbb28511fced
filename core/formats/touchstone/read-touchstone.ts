import { ok, type Result } from '../../result.ts';
import { makeSweep } from '../../sweep.ts';
import type { Assumption, ReadError, ReadLimits, ReadSweep } from '../read-types.ts';
import { inOrder } from './ascending.ts';
import { toleratedAssumptions } from './data-line.ts';
import { refuse } from './faults.ts';
import type { Points } from './points.ts';
import { pointsOfVersion1 } from './points-v1.ts';
import { pointsOfVersion2 } from './points-v2.ts';
import { type Normalisation, reflectionAt } from './port-reflection.ts';
import { readSections, type Sections } from './sections.ts';

export interface TouchstoneOptions {
  /** The port that the antenna is at. */
  readonly port?: 1 | 2;
  /** Whether version 1 immittances are divided by the reference, as the format says; default true. */
  readonly immittanceNormalised?: boolean;
  /** An option line for a file that lacks one. */
  readonly optionLine?: string;
  /** The name is a hint at the number of ports, checked against the content. */
  readonly fileName?: string;
  readonly limits: Pick<ReadLimits, 'maxPoints'>;
}

/**
 * Reads a Touchstone file of version 1, 2.0 or 2.1 with one or two ports. Tolerant: every liberty is
 * an assumption in the answer; what would be a guess is refused with line, column and remedy.
 */
export function readTouchstone(
  text: string,
  options: TouchstoneOptions,
): Result<ReadSweep, ReadError> {
  const sections = readSections(text, options.optionLine);
  if (!sections.ok) return sections;
  const { keywords, network, scanner } = sections.value;
  const points =
    keywords === null
      ? pointsOfVersion1(scanner, network)
      : pointsOfVersion2(scanner, network, keywords);
  if (!points.ok) return points;
  const { count } = points.value;
  if (count > options.limits.maxPoints) {
    const detail = `The file has ${count} points; at most ${options.limits.maxPoints} are read.`;
    return refuse('too_many_points', detail, 'Sweep with fewer points.');
  }
  const port = choosePort(points.value, sections.value, options);
  if (!port.ok) return port;
  const normalisation = normalisationOf(points.value, sections.value, port.value.port, options);
  if (!normalisation.ok) return normalisation;
  const read = readReflections(sections.value, points.value, normalisation.value);
  if (!read.ok) return read;
  const { frequencyHz, reflectionRe, reflectionIm } = read.value;
  const referenceOhm =
    port.value.port === 1 ? normalisation.value.reference1 : normalisation.value.reference2;
  const sweep = makeSweep({
    phase: 'signed',
    frequencyHz,
    reflectionRe,
    reflectionIm,
    referenceOhm,
  });
  if (!sweep.ok) return refuse(sweep.error.code, sweep.error.detail, 'Export the file again.');
  const assumptions = [
    ...sections.value.assumptions,
    ...points.value.assumptions,
    ...port.value.assumptions,
    ...toleratedAssumptions(sections.value.tolerated),
    ...read.value.assumptions,
    ...suspectImmittance(
      sections.value,
      points.value,
      normalisation.value,
      reflectionRe,
      reflectionIm,
    ),
    ...suspectUnit(frequencyHz, points.value.line[0]),
  ];
  return ok({
    sweep: sweep.value,
    format: keywords === null ? 'touchstone-1' : 'touchstone-2',
    assumptions,
    ...(points.value.ports === 2 ? { port: port.value.port } : {}),
  });
}

interface PortChoice {
  readonly port: 1 | 2;
  readonly assumptions: readonly Assumption[];
}

function choosePort(
  points: Points,
  { network, option }: Sections,
  { port, fileName }: TouchstoneOptions,
): Result<PortChoice, ReadError> {
  const line = points.line[0];
  const named = /\.s([12])p$/i.exec(fileName ?? '')?.[1];
  if (points.ports === 1) {
    if (port === 2) {
      const detail = 'Port 2 was asked for, but the file has one port.';
      return refuse('port_absent', detail, 'Leave `port` out.', { line });
    }
    const detail = 'The name says two ports, but each point has one pair; it was read as one port.';
    const assumptions = named === '2' ? [{ code: 'name_says_two_ports', detail, line }] : [];
    return ok({ port: 1, assumptions });
  }
  if (named === '1' && port === undefined) {
    const detail = 'The name says one port (3 numbers a point), but the points have more numbers.';
    const remedy =
      'If it is a two-port file, say which port the antenna is at: `port=1` or `port=2`.';
    return refuse('ports_differ', detail, remedy, { line });
  }
  if (port === 2 && points.at22 === null) {
    const detail = 'Port 2 was asked for, but the file holds S11 and S21 alone.';
    return refuse('port_absent', detail, 'Leave `port` out.', { line });
  }
  const assumptions: Assumption[] = [];
  if (port === undefined) {
    const detail = 'The file has two ports and none was named: port 1 was taken for the antenna.';
    assumptions.push({ code: 'port_assumed', detail, line });
  }
  if (option.parameter === 'S' && areOthersZero(points, network.values, port ?? 1)) {
    const detail = 'All other entries are exactly zero: they were taken as not measured.';
    assumptions.push({ code: 'others_not_measured', detail, line });
  } else {
    const detail =
      "The reflection is the antenna's only if the other port is closed by its reference; that was assumed.";
    assumptions.push({ code: 'other_port_matched', detail, line });
  }
  return ok({ port: port ?? 1, assumptions });
}

function areOthersZero(points: Points, values: Float64Array, port: 1 | 2): boolean {
  const offsets = [points.at12, points.at21, port === 1 ? points.at22 : points.at11];
  if (offsets.includes(null)) return false;
  for (let i = 0; i < points.count; i++) {
    for (const offset of offsets) {
      const at = points.start[i] + (offset ?? 0);
      if (values[at] !== 0 || values[at + 1] !== 0) return false;
    }
  }
  return true;
}

function normalisationOf(
  points: Points,
  { keywords, option }: Sections,
  port: 1 | 2,
  { immittanceNormalised = true }: TouchstoneOptions,
): Result<Normalisation, ReadError> {
  const given = keywords?.referenceOhm ?? option.referenceOhm;
  const line = points.line[0];
  if (given.length !== 1 && given.length !== points.ports) {
    const detail = `The file gives ${given.length} references for ${points.ports} ports.`;
    return refuse('references_differ', detail, 'Give one reference, or one for each port.', {
      line,
    });
  }
  if (keywords !== null && option.referenceOhm.length > 1) {
    const detail = 'The option line of a version 2 file gives references of several ports.';
    return refuse('references_differ', detail, 'Give them by `[Reference]`.', { line });
  }
  const [reference1, reference2 = reference1] = given;
  const isNormalised = keywords === null && immittanceNormalised;
  if (option.parameter !== 'S' && isNormalised && reference1 !== reference2) {
    const detail = 'Immittances normalised to unequal references are not defined by the format.';
    return refuse('references_differ', detail, 'Export S-parameters.', { line });
  }
  return ok({ port, reference1, reference2, isNormalised });
}

interface Reflections {
  readonly frequencyHz: Float64Array;
  readonly reflectionRe: Float64Array;
  readonly reflectionIm: Float64Array;
  readonly assumptions: readonly Assumption[];
}

function readReflections(
  { network, option, keywords }: Sections,
  points: Points,
  normalisation: Normalisation,
): Result<Reflections, ReadError> {
  const { count, start, line } = points;
  const { values } = network;
  const frequencyHz = new Float64Array(count);
  const reflectionRe = new Float64Array(count);
  const reflectionIm = new Float64Array(count);
  const lines = new Int32Array(count);
  let kept = 0;
  let foldedLine: number | null = null;
  const pair = normalisation.port === 1 ? points.at11 : (points.at22 ?? points.at11);
  const isPlain = option.parameter === 'S' && option.format === 'RI';
  for (let i = 0; i < count; i++) {
    const at = start[i];
    const f = values[at];
    if (f < 0) {
      const detail = `Line ${line[i]} has the negative frequency ${f} Hz.`;
      return refuse('sweep_frequency_negative', detail, 'Correct the frequency.', {
        line: line[i],
      });
    }
    if (option.format === 'MA' && values[at + pair] < 0) foldedLine ??= line[i];
    let re = values[at + pair];
    let im = values[at + pair + 1];
    if (!isPlain) [re, im] = reflectionAt(values, at, points, option, normalisation);
    if (!(Number.isFinite(f) && Number.isFinite(re) && Number.isFinite(im))) continue;
    frequencyHz[kept] = f;
    reflectionRe[kept] = re;
    reflectionIm[kept] = im;
    lines[kept] = line[i];
    kept += 1;
  }
  if (kept === 0) {
    const detail = 'No point of the file is a finite number.';
    return refuse('no_points', detail, 'Export the file again.', { line: line[0] });
  }
  const assumptions = reflectionAssumptions(count - kept, foldedLine, frequencyHz[0], line);
  const isTwoPort1 = keywords === null && points.ports === 2;
  const arrays = [frequencyHz, reflectionRe, reflectionIm].map((one) => one.subarray(0, kept));
  const ordered = inOrder(arrays, lines.subarray(0, kept), isTwoPort1);
  if (!ordered.ok) return ordered;
  const [f, re, im] = ordered.value.arrays;
  return ok({
    frequencyHz: f,
    reflectionRe: re,
    reflectionIm: im,
    assumptions: [...assumptions, ...ordered.value.assumptions],
  });
}

function reflectionAssumptions(
  dropped: number,
  foldedLine: number | null,
  lowestHz: number,
  line: Int32Array,
): Assumption[] {
  const assumptions: Assumption[] = [];
  if (dropped > 0) {
    const detail = `${dropped} points were left out because they are not finite numbers; there the antenna counts as not swept.`;
    assumptions.push({ code: 'points_left_out', detail });
  }
  if (foldedLine !== null) {
    const detail = 'Negative magnitudes were read as positive ones turned by 180 degrees.';
    assumptions.push({ code: 'magnitude_negative', detail, line: foldedLine });
  }
  if (lowestHz === 0) {
    const detail = 'The point at 0 Hz was kept; nothing is said of wavelengths there.';
    assumptions.push({ code: 'zero_frequency', detail, line: line[0] });
  }
  return assumptions;
}

/** Writers that put plain ohms into version 1 make themselves known by an absurd SWR. */
function suspectImmittance(
  { option }: Sections,
  points: Points,
  { isNormalised, reference1 }: Normalisation,
  re: Float64Array,
  im: Float64Array,
): Assumption[] {
  const { parameter } = option;
  if (!isNormalised || (parameter !== 'Z' && parameter !== 'Y') || reference1 === 1) return [];
  const factor = parameter === 'Z' ? 1 / reference1 : reference1;
  let isAbsurd = true;
  let isOtherSane = false;
  for (let i = 0; i < re.length; i++) {
    if (mismatchSquare(re[i], im[i], 1) < swr20) isAbsurd = false;
    if (mismatchSquare(re[i], im[i], factor) < swr10) isOtherSane = true;
  }
  if (!isAbsurd || !isOtherSane) return [];
  const detail =
    'Read as the format says (divided by the reference) the SWR is above 20 everywhere; read as plain ohms or siemens it would not be. Check which the instrument writes.';
  return [{ code: 'immittance_suspect', detail, line: points.line[0] }];
}

const swr20 = (19 / 21) ** 2;
const swr10 = (9 / 11) ** 2;

/** |Γ|² of the reflection after its normalised impedance is multiplied by a factor. */
function mismatchSquare(re: number, im: number, factor: number): number {
  const k = (1 - factor) / (1 + factor);
  const numerator = (re - k) ** 2 + im ** 2;
  return numerator / ((1 - k * re) ** 2 + (k * im) ** 2);
}

function suspectUnit(frequencyHz: Float64Array, line: number): Assumption[] {
  const lowest = frequencyHz[0];
  const highest = frequencyHz[frequencyHz.length - 1];
  if (lowest <= 10e9 && highest >= 1000) return [];
  const detail = `All frequencies lie ${lowest > 10e9 ? 'above 10 GHz' : 'below 1 kHz'}: check the unit in the option line.`;
  return [{ code: 'unit_suspect', detail, line }];
}
