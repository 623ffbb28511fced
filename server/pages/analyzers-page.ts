import type { AnalyzerWire } from '../routes/analyzers.ts';
import { type Html, html } from './html.ts';
import { texts } from './texts.ts';

const words = texts.analyzers;

/** The instruments of the club and what is known of their errors. */
export function analyzersPage(analyzers: readonly AnalyzerWire[]): Html {
  if (analyzers.length === 0) return html`<p>${words.empty}</p>`;
  return html`<p>${words.intro}</p>
<div class="wide" role="region" aria-label="${words.title}" tabindex="0"><table class="prose">
<thead><tr>${words.heads.map((head) => html`<th scope="col">${head}</th>`)}</tr></thead>
<tbody>${analyzers.map(
    ({ name, residual_errors: errors, note }) =>
      html`<tr><th scope="row">${name}</th><td>${errors === null ? words.unknown : errorsText(errors)}</td><td>${note}</td></tr>`,
  )}</tbody></table></div>`;
}

function errorsText(errors: NonNullable<AnalyzerWire['residual_errors']>): readonly Html[] {
  const { directivity_db: directivity, source_match_db: match, tracking_db: tracking } = errors;
  const known: readonly (readonly [string, number | null])[] = [
    [words.directivity, directivity],
    [words.sourceMatch, match],
    [words.tracking, tracking],
  ];
  return known.map(
    ([name, db]) => html`<div>${name} ${db === null ? words.unknown : `${db} dB`}</div>`,
  );
}
