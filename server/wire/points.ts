import { z } from 'zod';
import { reflectionMagnitude, type Sweep } from '../../core/sweep.ts';
import { idSchema } from './common.ts';
import { phaseSchema, planeSchema } from './summary.ts';

/** One quantity at every point; a value that is not finite (SWR at total reflection) is unknown. */
interface PointColumn {
  readonly name: string;
  readonly values: Float64Array;
}

const measuredColumn = z.array(z.number()).optional();
const derivedColumn = z.array(z.number().nullable()).optional();

/** The points of a sweep: one array for each quantity that is known. */
export const pointsSchema = z
  .object({
    sweep_id: idSchema,
    plane: planeSchema,
    phase: phaseSchema,
    reference_ohm: z.number(),
    frequency_hz: z.array(z.number()),
    reflection_re: measuredColumn,
    reflection_im: measuredColumn,
    reflection_im_magnitude: measuredColumn,
    reflection_magnitude: measuredColumn,
    swr: derivedColumn,
    resistance_ohm: derivedColumn,
    reactance_ohm: derivedColumn,
    reactance_magnitude_ohm: derivedColumn,
  })
  .meta({ id: 'Points', description: 'Arrays of equal length, by ascending frequency.' });

/** What is known at each point: the reflection as it is stored, and what follows from it. */
export function pointColumns(sweep: Sweep): readonly PointColumn[] {
  return [
    { name: 'frequency_hz', values: sweep.frequencyHz },
    ...reflectionColumns(sweep),
    { name: 'swr', values: reflectionMagnitude(sweep).map((rho) => swrOf(rho)) },
    ...impedanceColumns(sweep),
  ];
}

function reflectionColumns(sweep: Sweep): PointColumn[] {
  if (sweep.phase === 'none') {
    return [{ name: 'reflection_magnitude', values: sweep.reflectionMagnitude }];
  }
  const imaginary = sweep.phase === 'signed' ? 'reflection_im' : 'reflection_im_magnitude';
  return [
    { name: 'reflection_re', values: sweep.reflectionRe },
    { name: imaginary, values: sweep.reflectionIm },
  ];
}

/** Z = Z0 (1 + reflection) / (1 - reflection), in parts. */
function impedanceColumns(sweep: Sweep): PointColumn[] {
  if (sweep.phase === 'none') return [];
  const { referenceOhm, reflectionRe, reflectionIm } = sweep;
  const resistance = new Float64Array(reflectionRe.length);
  const reactance = new Float64Array(reflectionRe.length);
  for (let i = 0; i < resistance.length; i++) {
    const re = reflectionRe[i];
    const im = reflectionIm[i];
    const divisor = (1 - re) * (1 - re) + im * im;
    resistance[i] = (referenceOhm * (1 - re * re - im * im)) / divisor;
    reactance[i] = (2 * referenceOhm * im) / divisor;
  }
  const imaginary = sweep.phase === 'signed' ? 'reactance_ohm' : 'reactance_magnitude_ohm';
  return [
    { name: 'resistance_ohm', values: resistance },
    { name: imaginary, values: reactance },
  ];
}

function swrOf(rho: number): number {
  return rho < 1 ? (1 + rho) / (1 - rho) : Number.NaN;
}

/** The points as JSON text; unknown values are null. */
export function pointsJson(head: Readonly<Record<string, unknown>>, sweep: Sweep): string {
  const columns = pointColumns(sweep).map(
    ({ name, values }) => `"${name}":${JSON.stringify(Array.from(values))}`,
  );
  return `${JSON.stringify(head).slice(0, -1)},${columns.join(',')}}`;
}

/** The points as CSV (RFC 4180) with a header line; unknown values are empty. */
export function pointsCsv(sweep: Sweep): string {
  const columns = pointColumns(sweep);
  const lines = [columns.map(({ name }) => name).join(',')];
  for (let i = 0; i < sweep.frequencyHz.length; i++) {
    lines.push(columns.map(({ values }) => numberText(values[i])).join(','));
  }
  return `${lines.join('\r\n')}\r\n`;
}

function numberText(value: number): string {
  return Number.isFinite(value) ? String(value) : '';
}
