import { type Html, html } from './html.ts';
import { texts } from './texts.ts';

/** A frequency in MHz, to the kilohertz. */
export function megahertz(hz: number): string {
  return `${(hz / 1e6).toFixed(3)} MHz`;
}

/** A half-width or width of frequency: kHz with as many places as it deserves. */
export function kilohertz(hz: number): string {
  if (hz < 1000) return `${Number(hz.toPrecision(2))} Hz`;
  return `${Number((hz / 1000).toPrecision(hz < 10_000 ? 2 : 3))} kHz`;
}

/** An SWR: two places while they matter. */
export function swrText(swr: number): string {
  return swr < 10 ? swr.toFixed(2) : swr.toPrecision(3);
}

/** The half-width of a value, or nothing where it is not known. */
export function plusMinus(text: string | null): string {
  return text === null ? '' : ` ± ${text}`;
}

export function percent(fraction: number): string {
  return `${Math.round(fraction * 100)} %`;
}

const months = texts.months;

/** A time in UTC; the script of the page writes it in the zone of the reader. */
export function time(iso: string): Html {
  const [year, month, day] = iso.slice(0, 10).split('-');
  const words = `${Number(day)} ${months[Number(month) - 1]} ${year}, ${iso.slice(11, 16)} UTC`;
  return html`<time datetime="${iso}">${words}</time>`;
}
