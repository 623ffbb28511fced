import { factsOf, quantities } from '../../core/formats/delimited/quantities.ts';
import { type Html, html } from './html.ts';
import { texts } from './texts.ts';

const words = texts.upload;

/** What the service proposes to read from each column, or what the member chose instead. */
export interface ColumnsProposal {
  readonly columns: string;
  readonly evidence: readonly string[];
  readonly rows: readonly (readonly string[])[];
}

/** A proposal taken apart; null where it names columns by address, which a table cannot show. */
interface ByOrder {
  readonly columns: readonly string[];
  readonly reference: string;
  /** Delimiter and decimal mark, to be sent back as they are. */
  readonly options: string;
}

/** The part of the upload form in which a member confirms what the columns hold. */
export function columnsFields(proposal: ColumnsProposal, fileName: string): Html {
  const byOrder = takeApart(proposal.columns);
  const fields =
    byOrder === null
      ? html`<label for="columns">${words.columns}</label><input id="columns" name="columns" value="${proposal.columns}">`
      : columnTable(byOrder, proposal.rows, fileName);
  return html`<p>${words.confirm}</p>${fields}
<input type="hidden" name="proposal" value="${JSON.stringify(proposal)}">
${
  proposal.evidence.length === 0
    ? null
    : html`<details><summary>${words.evidence}</summary>
<ul>${proposal.evidence.map((one) => html`<li>${one}</li>`)}</ul></details>`
}`;
}

/** The `columns` parameter from the fields above; null if the form did not have them. */
export function columnsOf(form: FormData): string | null {
  const text = form.get('columns');
  if (typeof text === 'string') return text;
  const columns = form.getAll('column').map(String);
  if (columns.length === 0) return null;
  const reference = String(form.get('reference') ?? '').trim();
  const options = String(form.get('column_options') ?? '');
  return [
    ...columns,
    ...(reference === '' ? [] : [`reference=${reference}`]),
    ...(options === '' ? [] : [options]),
  ].join(',');
}

function takeApart(text: string): ByOrder | null {
  const items = text.split(',').map((item) => item.trim());
  const isOption = (item: string) => /^(delimiter|decimal)=/.test(item);
  const reference = items.find((item) => item.startsWith('reference='));
  const columns = items.filter((item) => item !== reference && !isOption(item));
  if (columns.some((item) => /[="]/.test(item))) return null;
  return {
    columns,
    reference: reference?.slice('reference='.length) ?? '',
    options: items.filter(isOption).join(','),
  };
}

function columnTable(
  { columns, reference, options }: ByOrder,
  rows: ColumnsProposal['rows'],
  fileName: string,
): Html {
  const heads = columns.map(
    (chosen, i) => html`<th scope="col"><label for="column-${i + 1}">${words.column(i + 1)}</label>
<select id="column-${i + 1}" name="column">${choices(chosen)}</select></th>`,
  );
  const cells = (row: readonly string[]) => columns.map((_, i) => html`<td>${row[i] ?? ''}</td>`);
  return html`<div class="wide" role="region" aria-label="${words.columnsCaption(fileName)}" tabindex="0"><table>
<caption>${words.columnsCaption(fileName)}</caption>
<thead><tr>${heads}</tr></thead>
<tbody>${rows.map((row) => html`<tr>${cells(row)}</tr>`)}</tbody></table></div>
<label for="reference">${words.reference}</label>
<input id="reference" name="reference" inputmode="decimal" value="${reference}">
<input type="hidden" name="column_options" value="${options}">`;
}

function choices(chosen: string): readonly Html[] {
  const known = allChoices.some(([value]) => value === chosen);
  const own: readonly Choice[] = known ? [] : [[chosen, chosen]];
  return [...own, ...allChoices].map(
    ([value, name]) =>
      html`<option value="${value}"${value === chosen ? html` selected` : null}>${name}</option>`,
  );
}

type Choice = readonly [value: string, name: string];

/** Every quantity in each of its units; a unit that may be left out is. */
const allChoices: readonly Choice[] = [
  ['skip', words.skip],
  ...quantities.flatMap((quantity): readonly Choice[] => {
    const { units, mustSayUnit, meaning } = factsOf(quantity);
    if (units.length === 0) return [[quantity, meaning]];
    return units.map((unit, i) => [
      i === 0 && !mustSayUnit ? quantity : `${quantity}:${unit}`,
      words.inUnit(meaning, unit),
    ]);
  }),
];
