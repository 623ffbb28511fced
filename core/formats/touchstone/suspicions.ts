import type { Assumption } from '../read-types.ts';
import type { OptionLine } from './option-line.ts';
import type { Normalisation } from './port-reflection.ts';
import type { Reflections } from './reflections.ts';

/** What looks wrong in points that were read as the format says: told, not changed. */
export function suspicions(
  reflections: Reflections,
  option: OptionLine,
  normalisation: Normalisation,
): Assumption[] {
  return [
    ...suspectImmittance(reflections, option, normalisation),
    ...suspectMagnitude(reflections),
    ...suspectUnit(reflections),
  ];
}

/** Writers that put plain ohms into version 1 make themselves known by an absurd SWR. */
function suspectImmittance(
  { reflectionRe: re, reflectionIm: im, line }: Reflections,
  { parameter }: OptionLine,
  { isNormalised, reference1 }: Normalisation,
): Assumption[] {
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
  return [{ code: 'immittance_suspect', detail, line: line[0] }];
}

const swr20 = (19 / 21) ** 2;
const swr10 = (9 / 11) ** 2;

/** |Γ|² of the reflection after its normalised impedance is multiplied by a factor. */
function mismatchSquare(re: number, im: number, factor: number): number {
  const k = (1 - factor) / (1 + factor);
  const numerator = (re - k) ** 2 + im ** 2;
  return numerator / ((1 - k * re) ** 2 + (k * im) ** 2);
}

export function suspectMagnitude({
  reflectionRe: re,
  reflectionIm: im,
  line,
}: Reflections): Assumption[] {
  let count = 0;
  let largest = 1;
  let first = 0;
  for (let i = 0; i < re.length; i++) {
    const square = re[i] * re[i] + im[i] * im[i];
    if (square <= 1) continue;
    if (count === 0) first = line[i];
    count += 1;
    largest = Math.max(largest, square);
  }
  if (count === 0) return [];
  const detail = `${count} points reflect more than arrives, up to a magnitude of ${Math.sqrt(largest).toPrecision(6)}; they were kept as they are and have no SWR.`;
  return [{ code: 'reflection_above_one', detail, line: first }];
}

function suspectUnit({ frequencyHz, line }: Reflections): Assumption[] {
  const lowest = frequencyHz[0];
  const highest = frequencyHz[frequencyHz.length - 1];
  if (lowest <= 10e9 && highest >= 1000) return [];
  const detail = `All frequencies lie ${lowest > 10e9 ? 'above 10 GHz' : 'below 1 kHz'}: check the unit in the option line.`;
  return [{ code: 'unit_suspect', detail, line: line[0] }];
}
