import type { ColumnMapping, MappedColumn } from './mapping.ts';
import { factsOf } from './quantities.ts';

/** Prints a mapping in the grammar of `columns`; reading it again gives the same mapping. */
export function formatColumns(mapping: ColumnMapping): string {
  const { columns, width, referenceOhm, delimiter, decimal } = mapping;
  const items =
    width === null
      ? columns.map((column) => `${addressText(column.address)}=${quantityText(column)}`)
      : inOrder(columns, width);
  if (referenceOhm !== null) items.push(`reference=${referenceOhm}`);
  if (delimiter !== null) items.push(`delimiter=${delimiter}`);
  if (decimal !== null) items.push(`decimal=${decimal}`);
  return items.join(',');
}

function inOrder(columns: readonly MappedColumn[], width: number): string[] {
  const items = new Array<string>(width).fill('skip');
  for (const column of columns) items[Number(column.address) - 1] = quantityText(column);
  return items;
}

function addressText(address: number | string): string {
  return typeof address === 'number' ? String(address) : `"${address.replaceAll('"', '""')}"`;
}

function quantityText({ quantity, unit }: MappedColumn): string {
  const { units, mustSayUnit } = factsOf(quantity);
  const isDefault = unit === units[0] && !mustSayUnit;
  return unit === null || isDefault ? quantity : `${quantity}:${unit}`;
}
