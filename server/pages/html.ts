/** Markup that may go into a page as it is. */
export class Html {
  readonly markup: string;

  constructor(markup: string) {
    this.markup = markup;
  }
}

type Piece = Html | string | number | null | readonly Piece[];

/**
 * Markup with values put in: text is escaped, so it is safe in content and in quoted attributes;
 * markup stays, lists are joined, and null leaves nothing.
 *
 * @example html`<p title="${'a "quote"'}">${'1 < 2'}</p>`
 */
export function html(parts: TemplateStringsArray, ...pieces: readonly Piece[]): Html {
  return new Html(
    parts.reduce((markup, part, i) => `${markup}${markupOf(pieces[i - 1] ?? null)}${part}`),
  );
}

function markupOf(piece: Piece): string {
  if (piece === null) return '';
  if (piece instanceof Html) return piece.markup;
  if (typeof piece === 'object') return piece.map(markupOf).join('');
  return String(piece).replace(/[&<>"']/g, (character) => entities[character] ?? character);
}

const entities: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};
