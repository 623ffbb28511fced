import { type Html, html } from './html.ts';
import type { ProblemBody } from './member-api.ts';
import { texts } from './texts.ts';

const words = texts.refusal;

/** What the interface refused, in its own words, with the places at fault. */
export function refusalPage(problem: ProblemBody): Html {
  return html`${faultOf(problem)}
<p class="aside">${words.number} <code>${problem.instance}</code></p>
<p><a href="/">${words.back}</a></p>`;
}

/** The fault alone, to stand above a form that may be sent again. */
export function faultOf({ title, detail, errors = [], existing }: ProblemBody): Html {
  const places = errors.filter((place) => !detail.startsWith(place.detail) || place.line);
  return html`<div class="fault" role="alert"><p><strong>${title}.</strong> ${detail}</p>
${places.length === 0 ? null : html`<ul>${places.map((place) => html`<li>${placeText(place)}</li>`)}</ul>`}
${existing === undefined ? null : html`<p><a href="/sweeps/${existing.sweep_id}">${words.existing}</a></p>`}</div>`;
}

function placeText(place: NonNullable<ProblemBody['errors']>[number]): string {
  const { line, column, parameter, detail } = place;
  const where = [
    ...(line === undefined ? [] : [words.line(line)]),
    ...(column === undefined ? [] : [words.column(column)]),
    ...(parameter === undefined || line !== undefined ? [] : [parameter]),
  ];
  return where.length === 0 ? detail : `${where.join(', ')}: ${detail}`;
}
