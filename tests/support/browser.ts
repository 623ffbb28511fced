import { existsSync, readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import type { AddressInfo } from 'node:net';
import { type Browser, type BrowserContext, chromium, type Page } from 'playwright-core';
import type { TestApp } from './test-app.ts';

const candidates = ['/usr/bin/chromium', '/usr/bin/chromium-browser', '/usr/bin/google-chrome'];

/** The browser that the tests drive; undefined where there is none. */
export const browserPath: string | undefined = candidates.find((path) => existsSync(path));

if (browserPath === undefined) {
  process.stderr.write('No Chromium was found: the tests of the pages are left out.\n');
}

/** A browser with a new, empty profile that calls nobody. */
export function openBrowser(): Promise<Browser> {
  if (browserPath === undefined) throw new Error('There is no Chromium here.');
  return chromium.launch({
    executablePath: browserPath,
    args: [
      '--headless',
      '--no-sandbox',
      '--disable-gpu',
      '--disable-quic',
      '--no-first-run',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync',
    ],
  });
}

/** Lets the service listen on a free port; returns where. */
export async function listen({ app }: TestApp): Promise<string> {
  await app.listen({ host: '127.0.0.1', port: 0 });
  const { port } = app.server.address() as AddressInfo;
  return `http://127.0.0.1:${port}`;
}

/** Opens a page that notes what the browser complains of: violated policies, faults of scripts. */
export async function openPage(
  context: BrowserContext,
): Promise<{ readonly page: Page; readonly complaints: string[] }> {
  const page = await context.newPage();
  const complaints: string[] = [];
  page.on('pageerror', ({ message }) => complaints.push(message));
  page.on('console', (message) => {
    // A status of 422 is an answer of a form, not a fault of the page.
    if (message.type() === 'error' && !/status of 4\d\d/.test(message.text())) {
      complaints.push(message.text());
    }
  });
  return { page, complaints };
}

/** Signs in as a member would: by pasting the token. */
export async function signIn(page: Page, base: string, token: string, path = '/'): Promise<void> {
  await page.goto(`${base}/sign-in?next=${encodeURIComponent(path)}`);
  await page.getByLabel('Token', { exact: true }).fill(token);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL((url) => url.pathname === path);
}

const axeSource = readFileSync(
  createRequire(import.meta.url).resolve('axe-core/axe.min.js'),
  'utf8',
);

/**
 * What axe-core finds against WCAG 2.2, levels A and AA, as `rule: place` lines. It is put in through
 * the debugger, so the policy of the page stays as strict as for a member.
 */
export async function accessibilityFaults(page: Page): Promise<readonly string[]> {
  await page.evaluate(axeSource);
  const found: { id: string; nodes: { target: string[] }[] }[] = await page.evaluate(
    "axe.run({ runOnly: ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'] }).then((r) => r.violations)",
  );
  return found.map(({ id, nodes }) => `${id}: ${nodes.map(({ target }) => target).join(' | ')}`);
}
