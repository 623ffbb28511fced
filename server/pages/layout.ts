import { icon, script, style } from './assets.ts';
import { type Html, html } from './html.ts';
import { texts } from './texts.ts';

/** Only what comes from here as a file of its own may run, style, load or be sent to. */
export const pagePolicy = [
  "default-src 'none'",
  "script-src 'self'",
  "style-src 'self'",
  "img-src 'self'",
  "connect-src 'self'",
  "form-action 'self'",
  "base-uri 'none'",
  "frame-ancestors 'none'",
].join('; ');

/** The club whose member looks; null before anybody has signed in. */
export interface Viewer {
  readonly clubName: string;
  readonly invented: boolean;
}

export interface PageParts {
  readonly title: string;
  readonly body: Html;
  readonly viewer?: Viewer | null;
  /** Path of the page, for the mark in the navigation. */
  readonly path?: string;
}

/** A whole page. It works without its script and can be read without its style. */
export function page({ title, body, viewer = null, path = '' }: PageParts): string {
  return html`<!doctype html>
<html lang="${texts.language}">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<meta name="color-scheme" content="light dark">
<title>${title} - ${texts.product}</title>
<link rel="icon" href="${icon.url}">
<link rel="stylesheet" href="${style.url}">
<script src="${script.url}" defer></script>
</head>
<body>
<a class="skip" href="#main">${texts.skip}</a>
<header class="top">
<p class="brand"><a href="/">${texts.product}</a></p>
${viewer === null ? null : navigation(viewer, path)}
</header>
<main id="main" tabindex="-1">
${viewer?.invented === true ? html`<p class="invented">${texts.inventedClub}</p>` : null}
<h1>${title}</h1>
${body}
</main>
<footer class="foot">
<p><span data-zone-note="${texts.timesInZone}">${texts.timesInUtc}</span> ${texts.footer} <a href="/problems">${texts.problems}</a></p>
</footer>
</body>
</html>
`.markup;
}

const places = [
  ['/', texts.nav.board],
  ['/upload', texts.nav.upload],
  ['/analyzers', texts.nav.analyzers],
] as const;

function navigation({ clubName }: Viewer, path: string): Html {
  const links = places.map(
    ([href, name]) =>
      html`<li><a href="${href}"${href === path ? html` aria-current="page"` : null}>${name}</a></li>`,
  );
  return html`<p class="club">${clubName}</p>
<nav aria-label="${texts.nav.label}"><ul>${links}</ul></nav>
<form method="post" action="/sign-out"><button class="quiet">${texts.signIn.out}</button></form>`;
}
