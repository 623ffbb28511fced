import { type ProblemKind, type ProblemSlug, problemKinds } from '../problems.ts';
import { type Html, html } from './html.ts';
import { page } from './layout.ts';

/** The page behind a problem's `type`. */
export function problemPage(slug: ProblemSlug): string {
  const kind: ProblemKind = problemKinds[slug];
  const body = html`<p>Status ${kind.status}, <code>/problems/${slug}</code></p>
<h2>What it means</h2>
<p>${text(kind.meaning)}</p>
<h2>What to do</h2>
<p>${text(kind.remedy)}</p>
<p><a href="/problems">All problems</a></p>`;
  return page({ title: kind.title, body });
}

/** The page that lists every problem. */
export function problemListPage(): string {
  const rows = Object.entries(problemKinds).map(
    ([slug, kind]) => html`<li>${kind.status} <a href="/problems/${slug}">${kind.title}</a></li>`,
  );
  return page({ title: 'Problems', body: html`<ul>${rows}</ul>` });
}

/** Text of the catalogue, with `code` as in Markdown. */
function text(source: string): readonly (Html | string)[] {
  return source.split('`').map((part, i) => (i % 2 === 1 ? html`<code>${part}</code>` : part));
}
