import { ok } from '../../result.ts';
import type { DecimalScanner } from '../decimal.ts';
import type { Assumption } from '../read-types.ts';
import { refuse } from './faults.ts';
import type { Keywords } from './keywords.ts';
import type { NumberTable } from './number-table.ts';
import { onePort, type PointLayout, type ReadPoints, twoPort } from './points.ts';
import { unscaledFirst } from './points-v1.ts';

/**
 * Makes points of the numbers behind `[Network Data]`: counted out, whatever the lines, but each
 * frequency must be the first number of its line.
 */
export function pointsOfVersion2(
  scanner: DecimalScanner,
  table: NumberTable,
  keywords: Keywords,
): ReadPoints {
  const { ports } = keywords;
  if (ports === null) {
    const remedy = 'Put `[Number of Ports]` directly after the option line.';
    return refuse('ports_missing', 'The file does not say `[Number of Ports]`.', remedy);
  }
  const isHalf = ports === 2 && keywords.matrixFormat !== 'full';
  const width = ports === 1 ? 3 : isHalf ? 7 : 9;
  const lastLine = table.lineNumber[table.rowCount - 1];
  if (table.valueCount % width !== 0) {
    const detail = `The data have ${table.valueCount} numbers, which is no multiple of the ${width} of a point.`;
    return refuse('row_width', detail, 'Correct the data, or export the file again.', {
      line: lastLine,
    });
  }
  const count = table.valueCount / width;
  const start = new Int32Array(count);
  const line = new Int32Array(count);
  let found = 0;
  for (let row = 0; row < table.rowCount; row++) {
    const first = table.firstValue[row];
    if (first % width !== 0) {
      table.values[first] = unscaledFirst(scanner, table, row);
      continue;
    }
    start[found] = first;
    line[found] = table.lineNumber[row];
    found += 1;
  }
  if (found !== count) {
    const detail = 'A frequency stands in the middle of a line.';
    return refuse('frequency_not_first', detail, 'Begin each point on a line of its own.', {
      line: lastLine,
    });
  }
  const assumptions = headerAssumptions(keywords, count, line[0]);
  return ok({ layout: layoutOf(keywords, isHalf), count, start, line, assumptions });
}

function layoutOf({ ports, twoPortOrder }: Keywords, isHalf: boolean): PointLayout {
  if (ports === 1) return onePort;
  if (isHalf) return { ports: 2, at11: 1, at12: 3, at21: 3, at22: 5 };
  return twoPortOrder === '12_21' ? { ...twoPort, at12: 3, at21: 5 } : twoPort;
}

function headerAssumptions(keywords: Keywords, count: number, line: number): Assumption[] {
  const assumptions: Assumption[] = [];
  const { frequencies, ports, twoPortOrder } = keywords;
  if (frequencies === null) {
    const detail = 'The file does not say `[Number of Frequencies]`; the points were counted.';
    assumptions.push({ code: 'frequencies_missing', detail, line });
  } else if (frequencies !== count) {
    const detail = `The file says ${frequencies} frequencies and has ${count}; what it has was kept.`;
    assumptions.push({ code: 'frequencies_differ', detail, line });
  }
  if (ports === 2 && twoPortOrder === null) {
    const detail =
      'The file does not say `[Two-Port Data Order]`; only the reflection was read, which does not depend on it.';
    assumptions.push({ code: 'order_missing', detail, line });
  }
  return assumptions;
}
