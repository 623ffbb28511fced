import { ok, type Result } from '../../result.ts';
import type { DecimalScanner } from '../decimal.ts';
import type { Assumption, ReadError } from '../read-types.ts';
import { refuse } from './faults.ts';
import type { NumberTable } from './number-table.ts';
import { onePort, type PointLayout, type ReadPoints, twoPort } from './points.ts';

const onePortWidth = 3;
const twoPortWidth = 9;
/** Frequency, S11 and S21 alone; also the width of a noise row. */
const forwardWidth = 5;

/**
 * Makes points of the rows of a file without keywords. Rows with an odd count of numbers begin a
 * point, rows with an even count go on with it. Behind the points of a two-port file may stand rows
 * of five: noise parameters, which begin at or below the last frequency and are passed over.
 */
export function pointsOfVersion1(scanner: DecimalScanner, table: NumberTable): ReadPoints {
  const width = table.commonWidth();
  if (width === onePortWidth || width === twoPortWidth) {
    const { firstValue, lineNumber, rowCount } = table;
    return pointsOfWidth(width, firstValue, lineNumber, rowCount, []);
  }
  const builder = new Version1Points(scanner, table);
  return builder.build();
}

class Version1Points {
  private readonly scanner: DecimalScanner;
  private readonly table: NumberTable;
  private readonly start: Int32Array;
  private readonly line: Int32Array;
  private count = 0;
  private width = 0;
  private readonly assumptions: Assumption[] = [];

  constructor(scanner: DecimalScanner, table: NumberTable) {
    this.scanner = scanner;
    this.table = table;
    this.start = new Int32Array(table.rowCount);
    this.line = new Int32Array(table.rowCount);
  }

  build(): ReadPoints {
    const { table } = this;
    let row = 0;
    while (row < table.rowCount) {
      const last = this.lastRowOfPoint(row);
      const width = this.widthOfRows(row, last);
      if (width === forwardWidth && this.width === twoPortWidth) return this.passNoise(row);
      const fault = this.checkWidth(row, last, width);
      if (fault !== null) return fault;
      if (last > row) this.unwrap(row, last);
      this.start[this.count] = table.firstValue[row];
      this.line[this.count] = table.lineNumber[row];
      this.count += 1;
      row = last + 1;
    }
    return this.finish();
  }

  private lastRowOfPoint(row: number): number {
    const { table } = this;
    let last = row;
    while (last + 1 < table.rowCount && table.widthOf(last + 1) % 2 === 0) last += 1;
    return last;
  }

  private widthOfRows(first: number, last: number): number {
    const { table } = this;
    const end = last + 1 < table.rowCount ? table.firstValue[last + 1] : table.valueCount;
    return end - table.firstValue[first];
  }

  private checkWidth(row: number, last: number, width: number): Result<never, ReadError> | null {
    const line = this.table.lineNumber[row];
    const expected = this.width === 0 ? [onePortWidth, twoPortWidth, forwardWidth] : [this.width];
    const isWrapped = last > row;
    if (expected.includes(width) && (!isWrapped || width === twoPortWidth)) {
      this.width = width;
      return null;
    }
    const found = this.table.widthOf(row);
    const wanted = expected.join(' or ');
    const detail = `Line ${line} has ${found} numbers where a point has ${wanted}.`;
    const remedy =
      'One-port files have 3 numbers on a line (frequency and one pair), two-port files 9. Correct the line, or export the file again.';
    return refuse('row_width', detail, remedy, { line });
  }

  /** A point over several lines: their first numbers are no frequencies, so they were not scaled. */
  private unwrap(first: number, last: number): void {
    const { table, scanner } = this;
    for (let row = first + 1; row <= last; row++) {
      table.values[table.firstValue[row]] = unscaledFirst(scanner, table, row);
    }
    if (this.assumptions.some(({ code }) => code === 'point_wrapped')) return;
    const detail = 'A point goes over several lines; the lines were taken together.';
    this.assumptions.push({ code: 'point_wrapped', detail, line: table.lineNumber[first] });
  }

  private passNoise(firstRow: number): ReadPoints {
    const { table } = this;
    const lastHz = table.values[this.start[this.count - 1]];
    let previous = Number.NEGATIVE_INFINITY;
    for (let row = firstRow; row < table.rowCount; row++) {
      const line = table.lineNumber[row];
      const f = table.values[table.firstValue[row]];
      const isInOrder = row === firstRow ? f <= lastHz : f > previous;
      if (table.widthOf(row) !== forwardWidth || !isInOrder) {
        const detail = `Line ${line} is neither a point of 9 numbers nor a noise row of 5 in its order.`;
        return refuse('row_width', detail, 'Correct the line, or export the file again.', { line });
      }
      previous = f;
    }
    const rows = table.rowCount - firstRow;
    const detail = `${rows} rows of noise parameters were passed over.`;
    this.assumptions.push({ code: 'noise_passed_over', detail, line: table.lineNumber[firstRow] });
    return this.finish();
  }

  private finish(): ReadPoints {
    const { start, line, count, width, assumptions } = this;
    return pointsOfWidth(width, start, line, count, assumptions);
  }
}

function pointsOfWidth(
  width: number,
  start: Int32Array,
  line: Int32Array,
  count: number,
  assumptions: readonly Assumption[],
): ReadPoints {
  if (width === onePortWidth) return ok({ layout: onePort, count, start, line, assumptions });
  if (width === twoPortWidth) return ok({ layout: twoPort, count, start, line, assumptions });
  const detail = 'Each line has five numbers: the first pair was taken as S11, the second as S21.';
  const forward: Assumption = { code: 'forward_only', detail, line: line[0] };
  const layout: PointLayout = { ...twoPort, at12: null, at22: null };
  return ok({ layout, count, start, line, assumptions: [...assumptions, forward] });
}

/** The first number of a row as it stands in the text. */
export function unscaledFirst(scanner: DecimalScanner, table: NumberTable, row: number): number {
  const { text } = scanner;
  let at = table.textStart[row];
  while (text.charCodeAt(at) === 32 || text.charCodeAt(at) === 9) at += 1;
  return scanner.read(at);
}
