import { grounds, weathers } from '../../core/record/conditions.ts';
import { type ColumnsProposal, columnsFields } from './columns-form.ts';
import { type Html, html } from './html.ts';
import type { ProblemBody } from './member-api.ts';
import { faultOf } from './refusal-page.ts';
import { texts } from './texts.ts';

const words = texts.upload;

/** A record to choose by its key. */
interface Named {
  readonly key: string;
  readonly name: string;
}

/** A file that was sent and is to be sent again once its columns are confirmed. */
export interface SentFile {
  readonly name: string;
  /** Base64; null: too large to travel in the form. */
  readonly kept: string | null;
}

export interface UploadPageParts {
  readonly antennas: readonly Named[];
  readonly analyzers: readonly Named[];
  /** What was filled in before, by the name of the field. */
  readonly filled: ReadonlyMap<string, string>;
  readonly problem: ProblemBody | null;
  readonly proposal: ColumnsProposal | null;
  readonly sent: SentFile | null;
}

/** The form that takes a file with what is told of it; asks about columns where it must. */
export function uploadPage(parts: UploadPageParts): Html {
  const { antennas, problem, proposal, sent } = parts;
  if (antennas.length === 0) return html`<p>${words.noAntenna}</p>`;
  const asksColumns = proposal !== null && sent !== null;
  return html`${problem === null ? null : faultOf(problem)}
<p class="caution">${words.safety}</p>
<form method="post" action="/upload" enctype="multipart/form-data" class="upload" data-sending="${words.sending}" data-reading="${words.reading}" data-failed="${words.failed}">
${asksColumns ? columnsSection(proposal, sent) : null}
<div class="stack">${asksColumns ? null : filePicker()}
${factFields(parts)}
<button>${asksColumns ? words.confirmButton : words.button}</button></div>
<p class="progress" role="status"></p>
</form>`;
}

function columnsSection(proposal: ColumnsProposal, sent: SentFile): Html {
  return html`<section><h2>${words.confirmTitle}</h2>${columnsFields(proposal, sent.name)}
<input type="hidden" name="kept_name" value="${sent.name}">
${
  sent.kept === null
    ? html`<p>${words.chooseAgain}</p>${filePicker()}`
    : html`<input type="hidden" name="kept_file" value="${sent.kept}">`
}</section>`;
}

function filePicker(): Html {
  return html`<label for="file">${words.file}</label>
<input id="file" name="file" type="file" required aria-describedby="file-help">
<p id="file-help" class="aside">${words.fileHelp}</p>`;
}

function factFields({ antennas, analyzers, filled }: UploadPageParts): Html {
  const value = (name: string) => filled.get(name) ?? '';
  const plain = (name: string, label: string, type: Html = html``) =>
    html`<label for="${name}">${label}</label><input id="${name}" name="${name}" value="${value(name)}"${type}>`;
  const choice = (name: string, label: string, options: readonly Html[]) =>
    html`<label for="${name}">${label}</label><select id="${name}" name="${name}">${options}</select>`;
  const option = (chosen: string, key: string, name: string) =>
    html`<option value="${key}"${key === chosen ? html` selected` : null}>${name}</option>`;
  const named = (field: string, all: readonly Named[]) =>
    all.map(({ key, name }) => option(value(field), key, name));
  const unsaid = html`<option value="">${texts.notSaid}</option>`;
  return html`${choice('antenna', words.antenna, named('antenna', antennas))}
<label for="measured_at" data-zone-label="${words.measuredAtZone}">${words.measuredAt}</label>
<input id="measured_at" name="measured_at" type="datetime-local" value="${value('measured_at')}">
<input type="hidden" name="measured_at_utc" value="">
${choice('analyzer', words.analyzer, [unsaid, ...named('analyzer', analyzers)])}
${choice('plane', words.plane, [
  option(value('plane'), 'measured', words.planes.measured),
  option(value('plane'), 'feed_point', words.planes.feed_point),
])}
<details><summary>${words.more}</summary><div class="stack">
${choice('weather', words.weather, [unsaid, ...weathers.map((one) => option(value('weather'), one, words.weathers[one]))])}
${plain('temperature_c', words.temperature, html` type="number" step="any"`)}
${plain('wind_m_s', words.wind, html` type="number" step="any" min="0"`)}
${choice('ground', words.ground, [unsaid, ...grounds.map((one) => option(value('ground'), one, words.grounds[one]))])}
${plain('conditions', words.conditions, html` maxlength="500"`)}
<label for="note">${words.note}</label><textarea id="note" name="note" maxlength="2000" rows="3">${value('note')}</textarea>
</div></details>`;
}
