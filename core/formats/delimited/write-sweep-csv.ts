import type { Sweep } from '../../sweep.ts';
import { formatColumns } from './format-columns.ts';
import { fromReflection } from './from-reflection.ts';
import type { MappedColumn } from './mapping.ts';
import type { Quantity, Unit } from './quantities.ts';

/** A column of the table: its header, what it holds, and whether reading back needs it. */
interface WrittenColumn {
  readonly header: string;
  readonly quantity: Quantity;
  readonly unit: Unit | null;
  readonly isSource: boolean;
}

function written(
  header: string,
  quantity: Quantity,
  {
    unit = null,
    isSource = false,
  }: { readonly unit?: Unit | null; readonly isSource?: boolean } = {},
): WrittenColumn {
  return { header, quantity, unit, isSource };
}

const frequency = written('frequency_hz', 'frequency', { unit: 'Hz', isSource: true });
const source = { isSource: true };
const ohm: { readonly unit: Unit } = { unit: 'ohm' };

const columnsByPhase: Readonly<Record<Sweep['phase'], readonly WrittenColumn[]>> = {
  signed: [
    frequency,
    written('reflection_re', 'reflection_re', source),
    written('reflection_im', 'reflection_im', source),
    written('resistance_ohm', 'resistance', ohm),
    written('reactance_ohm', 'reactance', ohm),
    written('swr', 'swr'),
  ],
  unsigned: [
    frequency,
    written('reflection_re', 'reflection_re', source),
    written('reflection_im_magnitude', 'reflection_im_magnitude', source),
    written('resistance_ohm', 'resistance', ohm),
    written('reactance_magnitude_ohm', 'reactance_magnitude', ohm),
    written('swr', 'swr'),
  ],
  none: [
    frequency,
    written('reflection_magnitude', 'reflection_magnitude', { unit: 'fraction', isSource: true }),
    written('swr', 'swr'),
  ],
};

/**
 * Writes a sweep as comma-separated text (RFC 4180: a header line, CR LF): frequency in hertz, the
 * reflection, and the impedance and SWR computed from it; a cell is empty where there is no value
 * (SWR of a reflection of 1 or more, impedance of an open end). Numbers are the shortest that read
 * back bit for bit.
 */
export function writeSweepCsv(sweep: Sweep): string {
  const columns = columnsByPhase[sweep.phase];
  const lines = [columns.map(({ header }) => header).join(',')];
  const isScalar = sweep.phase === 'none';
  const first = isScalar ? sweep.reflectionMagnitude : sweep.reflectionRe;
  for (let i = 0; i < sweep.frequencyHz.length; i++) {
    const im = isScalar ? 0 : sweep.reflectionIm[i];
    const cells = columns.map(({ quantity }) =>
      quantity === 'frequency'
        ? decimalText(sweep.frequencyHz[i])
        : decimalText(fromReflection(quantity, first[i], im, sweep.referenceOhm)),
    );
    lines.push(cells.join(','));
  }
  lines.push('');
  return lines.join('\r\n');
}

/** The `columns` with which the text of `writeSweepCsv` reads back as the same sweep. */
export function sweepCsvColumns(sweep: Sweep): string {
  const all = columnsByPhase[sweep.phase];
  const columns = all.flatMap(({ quantity, unit, isSource }, i): MappedColumn[] =>
    isSource ? [{ address: i + 1, quantity, unit }] : [],
  );
  const { referenceOhm } = sweep;
  return formatColumns({
    columns,
    width: all.length,
    referenceOhm,
    delimiter: null,
    decimal: null,
  });
}

/** The shortest decimal; a negative zero keeps its sign; empty where there is no finite value. */
function decimalText(value: number): string {
  if (!Number.isFinite(value)) return '';
  return Object.is(value, -0) ? '-0' : String(value);
}
