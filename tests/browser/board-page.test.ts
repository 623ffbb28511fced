import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { EventStream } from '../../server/events/event-stream.ts';
import {
  accessibilityFaults,
  browserPath,
  listen,
  openBrowser,
  openPage,
  signIn,
} from '../support/browser.ts';
import { addAntenna, upload } from '../support/club-records.ts';
import { dipoleFile } from '../support/dipole-file.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

describe.skipIf(browserPath === undefined)('the board of a club', () => {
  let test: TestApp;
  let base: string;
  let browser: Browser;

  beforeAll(async () => {
    test = await makeTestApp();
    await addAntenna(test);
    base = await listen(test);
    browser = await openBrowser();
  });
  afterAll(async () => {
    await browser?.close();
    await test.close();
  });

  it('shows a sweep that somebody uploads while it is looked at', async () => {
    const { page, complaints } = await openPage(await browser.newContext());
    await signIn(page, base, test.token);
    const row = page.getByRole('row', { name: /Field dipole/ });
    expect(await row.textContent()).toContain('not tested');
    await upload(test, dipoleFile());
    await row.getByText('partly usable').waitFor();
    expect(await row.textContent()).toContain('lowest SWR');
    expect(await page.getByRole('status').textContent()).toContain('brought up to date');
    expect(await accessibilityFaults(page)).toEqual([]);
    expect(complaints).toEqual([]);
  });

  it('leaves no open stream behind when it is left', async () => {
    const closed = new Promise<void>((resolve) => {
      const destroy = EventStream.prototype._destroy;
      EventStream.prototype._destroy = function (error, done) {
        EventStream.prototype._destroy = destroy;
        resolve();
        destroy.call(this, error, done);
      };
    });
    const { page } = await openPage(await browser.newContext());
    const opened = page.waitForResponse(`${base}/board/events`);
    await signIn(page, base, test.token);
    await opened;
    await page.close();
    await closed;
  });

  it('shows the analyzers, and lists nothing sideways on a phone', async () => {
    const payload = { key: 'bench', name: 'Bench analyzer' };
    await test.call({ method: 'POST', url: '/v1/analyzers', payload });
    const viewport = { width: 375, height: 700 };
    const { page } = await openPage(await browser.newContext({ viewport, colorScheme: 'dark' }));
    await signIn(page, base, test.token);
    for (const path of ['/', '/analyzers', '/upload', '/antennas/field-20m']) {
      await page.goto(base + path);
      expect(await page.evaluate('document.documentElement.scrollWidth')).toBe(375);
      expect(await accessibilityFaults(page)).toEqual([]);
    }
    await page.goto(`${base}/analyzers`);
    expect(await page.locator('main').textContent()).toContain('Bench analyzer');
  });

  it('leads to the antenna with its charts, its work and its latest report', async () => {
    const payload = { kind: 'trimmed', done_at: '2026-05-01T10:00:00Z', length_mm: 80 };
    await test.call({ method: 'POST', url: '/v1/antennas/field-20m/work', payload });
    const { page, complaints } = await openPage(await browser.newContext());
    await signIn(page, base, test.token);
    await page.getByRole('link', { name: 'Field dipole' }).click();
    await page.waitForURL(`${base}/antennas/field-20m`);
    await page.waitForLoadState('networkidle');
    const text = await page.locator('main').textContent();
    expect(text).toContain('shortened, 80 mm');
    expect(text).toMatch(/20m\s*partly usable/);
    const widths: number[] = await page.evaluate(
      '[...document.images].map((image) => image.complete ? image.naturalWidth : 0)',
    );
    expect(widths).toEqual([520, 520]);
    expect(await accessibilityFaults(page)).toEqual([]);
    expect(complaints).toEqual([]);
  });
});
