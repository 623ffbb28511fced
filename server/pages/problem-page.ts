import { type ProblemKind, type ProblemSlug, problemKinds } from '../problems.ts';
import { escapeHtml, page } from './page.ts';

/** The page behind a problem's `type`. */
export function problemPage(slug: ProblemSlug): string {
  const kind: ProblemKind = problemKinds[slug];
  return page(
    kind.title,
    `<p>Status ${kind.status}, <code>/problems/${slug}</code></p>
<h2>What it means</h2>
<p>${text(kind.meaning)}</p>
<h2>What to do</h2>
<p>${text(kind.remedy)}</p>
<p><a href="/problems">All problems</a></p>`,
  );
}

/** The page that lists every problem. */
export function problemListPage(): string {
  const rows = Object.entries(problemKinds).map(
    ([slug, kind]) =>
      `<li>${kind.status} <a href="/problems/${slug}">${escapeHtml(kind.title)}</a></li>`,
  );
  return page('Problems', `<ul>\n${rows.join('\n')}\n</ul>`);
}

/** Text of the catalogue: escaped, with `code` as in Markdown. */
function text(source: string): string {
  return escapeHtml(source).replace(/`([^`]+)`/g, '<code>$1</code>');
}
