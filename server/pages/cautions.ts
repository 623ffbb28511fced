import { type Html, html } from './html.ts';
import { texts } from './texts.ts';

interface Caution {
  readonly code: string;
  readonly detail: string;
}

/** Those by which people come to harm; the rest guards against misreading. */
const safetyCodes = new Set([
  'rf_exposure',
  'antenna_voltage',
  'power_lines',
  'lightning',
  'climbing',
]);

/** Cautions on reading the numbers, to stand beside them. */
export function readingCautions(cautions: readonly Caution[]): Html | null {
  return list(
    texts.sweep.heed,
    cautions.filter(({ code }) => !safetyCodes.has(code)),
  );
}

/** Cautions for work at the antenna. */
export function safetyCautions(cautions: readonly Caution[]): Html | null {
  return list(
    texts.sweep.safety,
    cautions.filter(({ code }) => safetyCodes.has(code)),
  );
}

function list(title: string, cautions: readonly Caution[]): Html | null {
  if (cautions.length === 0) return null;
  const unique = [...new Set(cautions.map(({ detail }) => detail))];
  return html`<section class="caution"><h2>${title}</h2>
<ul>${unique.map((detail) => html`<li>${detail}</li>`)}</ul></section>`;
}
