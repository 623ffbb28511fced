import { fail, ok, type Result } from '../../result.ts';
import { parseDecimal } from '../decimal.ts';
import type { ReadError } from '../read-types.ts';
import type { ColumnMapping, DecimalMark, Delimiter, MappedColumn } from './mapping.ts';
import { factsOf, isQuantity, quantities, type Unit } from './quantities.ts';

const delimiters: readonly Delimiter[] = ['comma', 'semicolon', 'tab', 'blanks'];
const decimalMarks: readonly DecimalMark[] = ['point', 'comma'];
const highestColumn = 1000;
const example = 'Write it like `frequency:MHz,resistance,reactance` or `1=frequency:MHz,4=swr`.';

/** A mapping while its items are read. */
interface Draft {
  readonly columns: MappedColumn[];
  /** Columns listed by order so far, skipped ones included. */
  ordered: number;
  isAddressed: boolean;
  referenceOhm: number | null;
  delimiter: Delimiter | null;
  decimal: DecimalMark | null;
}

/**
 * Reads the `columns` parameter (see `columnsGrammar`). Errors, all about the parameter:
 * `columns_syntax`, `columns_quantity_unknown`, `columns_unit_missing`, `columns_unit_unknown`,
 * `columns_option_unknown`, `columns_twice`, `columns_mixed`, `columns_without_frequency`.
 */
export function parseColumns(text: string): Result<ColumnMapping, ReadError> {
  const draft: Draft = {
    columns: [],
    ordered: 0,
    isAddressed: false,
    referenceOhm: null,
    delimiter: null,
    decimal: null,
  };
  for (const item of itemsOf(text)) {
    const fault = takeItem(draft, item);
    if (fault !== null) return fault;
  }
  const { columns, ordered, isAddressed, referenceOhm, delimiter, decimal } = draft;
  if (ordered > 0 && isAddressed) {
    const detail = 'Columns are listed by order and addressed by number or header at once.';
    return refuse('columns_mixed', detail, 'List all by order, with `skip`, or address all.');
  }
  if (!columns.some(({ quantity }) => quantity === 'frequency')) {
    return refuse('columns_without_frequency', 'No column is the frequency.', example);
  }
  const width = ordered > 0 ? ordered : null;
  return ok({ columns, width, referenceOhm, delimiter, decimal });
}

/** Cuts at the commas outside double quotes. */
function itemsOf(text: string): string[] {
  const items: string[] = [];
  let start = 0;
  let isQuoted = false;
  for (let i = 0; i <= text.length; i++) {
    const char = text[i];
    if (char === '"') isQuoted = !isQuoted;
    if (i < text.length && (char !== ',' || isQuoted)) continue;
    items.push(text.slice(start, i).trim());
    start = i + 1;
  }
  return items;
}

type Fault = Result<never, ReadError> | null;

function takeItem(draft: Draft, item: string): Fault {
  const quoted = /^"((?:[^"]|"")*)"\s*=(.*)$/s.exec(item);
  if (quoted !== null) return takeHeader(draft, quoted[1].replaceAll('""', '"').trim(), quoted[2]);
  if (item.includes('"')) {
    const detail = `\`${shown(item)}\` is not of the form \`"header text"=quantity\`.`;
    return refuse('columns_syntax', detail, example);
  }
  const equals = item.indexOf('=');
  if (equals < 0) return takeOrdered(draft, item);
  const left = item.slice(0, equals).trim();
  const right = item.slice(equals + 1).trim();
  if (!/^\d+$/.test(left)) return takeOption(draft, left.toLowerCase(), right);
  const number = Number(left);
  if (number >= 1 && number <= highestColumn) return takeAddressed(draft, number, right);
  const detail = `\`${shown(left)}\` is no column number: they go from 1 to ${highestColumn}.`;
  return refuse('columns_syntax', detail, example);
}

function takeHeader(draft: Draft, header: string, right: string): Fault {
  if (header !== '') return takeAddressed(draft, header, right);
  return refuse('columns_syntax', 'A header text is empty.', 'Address that column by its number.');
}

function takeAddressed(draft: Draft, address: number | string, right: string): Fault {
  draft.isAddressed = true;
  return takeColumn(draft, address, right.trim());
}

function takeOrdered(draft: Draft, item: string): Fault {
  if (item === '') {
    const detail = 'An item between commas is empty.';
    return refuse('columns_syntax', detail, 'Write `skip` for a column that is not to be read.');
  }
  draft.ordered += 1;
  if (draft.ordered > highestColumn) {
    return refuse('columns_syntax', `More than ${highestColumn} columns are listed.`, example);
  }
  if (item.toLowerCase() === 'skip') return null;
  return takeColumn(draft, draft.ordered, item);
}

function takeColumn(draft: Draft, address: number | string, text: string): Fault {
  const [name, unitName = '', ...more] = text.split(':').map((part) => part.trim());
  const quantity = name.toLowerCase();
  if (!isQuantity(quantity)) {
    const detail = `\`${shown(name)}\` is no quantity.`;
    const remedy = `Take one of ${quantities.join(', ')}; by order also skip.`;
    return refuse('columns_quantity_unknown', detail, remedy);
  }
  const { units, mustSayUnit } = factsOf(quantity);
  const unit = units.find((known) => known.toLowerCase() === unitName.toLowerCase());
  const listed = units.map((known) => `\`${quantity}:${known}\``).join(' or ');
  const isBare = !text.includes(':');
  if (more.length > 0 || (!isBare && unit === undefined)) {
    const detail = `\`${shown(text)}\` has a unit that \`${quantity}\` cannot have.`;
    const remedy = units.length === 0 ? `Write \`${quantity}\`.` : `Write ${listed}.`;
    return refuse('columns_unit_unknown', detail, remedy);
  }
  if (isBare && mustSayUnit) {
    return refuse('columns_unit_missing', `\`${quantity}\` needs a unit.`, `Write ${listed}.`);
  }
  const twice = draft.columns.find(
    (column) => column.quantity === quantity || column.address === address,
  );
  if (twice !== undefined) {
    const what = twice.quantity === quantity ? quantity : String(address);
    return refuse('columns_twice', `\`${shown(what)}\` stands twice.`, 'Give each column once.');
  }
  const fallback: Unit | undefined = units[0];
  draft.columns.push({ address, quantity, unit: unit ?? fallback ?? null });
  return null;
}

function takeOption(draft: Draft, name: string, value: string): Fault {
  const word = value.toLowerCase();
  if (name === 'delimiter') {
    const delimiter = delimiters.find((known) => known === word);
    if (delimiter === undefined) return badOption(name, value, delimiters);
    if (draft.delimiter !== null) return optionTwice(name);
    draft.delimiter = delimiter;
    return null;
  }
  if (name === 'decimal') {
    const decimal = decimalMarks.find((known) => known === word);
    if (decimal === undefined) return badOption(name, value, decimalMarks);
    if (draft.decimal !== null) return optionTwice(name);
    draft.decimal = decimal;
    return null;
  }
  if (name === 'reference') {
    const ohms = parseDecimal(value);
    if (!(ohms > 0)) return badOption(name, value, ['a positive number of ohms']);
    if (draft.referenceOhm !== null) return optionTwice(name);
    draft.referenceOhm = ohms;
    return null;
  }
  const detail = `\`${shown(name)}\` is neither a column number nor an option.`;
  const remedy =
    'The options are reference, delimiter and decimal; a header text stands in double quotes.';
  return refuse('columns_option_unknown', detail, remedy);
}

function badOption(name: string, value: string, allowed: readonly string[]): Fault {
  const detail = `\`${name}\` cannot be \`${shown(value)}\`.`;
  return refuse('columns_option_unknown', detail, `It takes ${allowed.join(', ')}.`);
}

function optionTwice(name: string): Fault {
  return refuse('columns_twice', `\`${name}\` stands twice.`, 'Give each option once.');
}

function shown(text: string): string {
  return text.length > 40 ? `${text.slice(0, 40)}…` : text;
}

function refuse(code: string, detail: string, remedy: string): Result<never, ReadError> {
  return fail({ code, detail: `In \`columns\`: ${detail}`, remedy, parameter: 'columns' });
}
