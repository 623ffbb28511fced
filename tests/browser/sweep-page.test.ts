import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
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

describe.skipIf(browserPath === undefined)('a member with a browser', () => {
  let test: TestApp;
  let base: string;
  let browser: Browser;
  let sweepPath: string;

  beforeAll(async () => {
    test = await makeTestApp();
    await addAntenna(test);
    const kept = await upload(test, dipoleFile());
    sweepPath = `/sweeps/${kept.json().id}`;
    base = await listen(test);
    browser = await openBrowser();
  });
  afterAll(async () => {
    await browser?.close();
    await test.close();
  });

  it('who has not signed in is asked to, and then sees what was asked for', async () => {
    const { page, complaints } = await openPage(await browser.newContext());
    await page.goto(base + sweepPath);
    expect(new URL(page.url()).pathname).toBe('/sign-in');
    await page.getByLabel('Token', { exact: true }).fill(`  ${test.token}\n`);
    await page.keyboard.press('Enter');
    await page.waitForURL(base + sweepPath);
    await expect(page.locator('h1').textContent()).resolves.toContain('Field dipole');
    expect(complaints).toEqual([]);
  });

  it('is told so if the token is not valid', async () => {
    const { page } = await openPage(await browser.newContext());
    await page.goto(`${base}/sign-in`);
    await page.getByLabel('Token', { exact: true }).fill('sl_nothing');
    await page.keyboard.press('Enter');
    await page.getByRole('alert').waitFor();
    expect(await page.getByRole('alert').textContent()).toContain('not valid');
    expect(await page.context().cookies()).toEqual([]);
  });

  it('keeps the token where no script reaches it and no other site sends it', async () => {
    const context = await browser.newContext();
    const { page } = await openPage(context);
    await signIn(page, base, test.token, sweepPath);
    const [cookie] = await context.cookies();
    expect(cookie).toMatchObject({ httpOnly: true, sameSite: 'Strict', path: '/', expires: -1 });
    expect(await page.evaluate('document.cookie')).toBe('');
  });

  it('is asked anew after signing out', async () => {
    const { page } = await openPage(await browser.newContext());
    await signIn(page, base, test.token, sweepPath);
    await page.getByRole('button', { name: 'Sign out' }).click();
    await page.waitForURL(`${base}/sign-in`);
    await page.goto(base + sweepPath);
    expect(new URL(page.url()).pathname).toBe('/sign-in');
  });

  it('reads the minimum in words, the verdict and the cautions', async () => {
    const { page, complaints } = await openPage(await browser.newContext());
    await signIn(page, base, test.token, sweepPath);
    const text = await page.locator('main').textContent();
    expect(text).toMatch(/SWR is lowest at 14\.1\d\d MHz/);
    expect(text).toMatch(/20m\s*partly usable/);
    expect(text).toContain('Contact kills.');
    expect(await accessibilityFaults(page)).toEqual([]);
    expect(complaints).toEqual([]);
  });

  it('finds the way from the board to the sweep', async () => {
    const { page, complaints } = await openPage(await browser.newContext());
    await signIn(page, base, test.token);
    expect(await accessibilityFaults(page)).toEqual([]);
    await page.getByRole('link', { name: 'Field dipole' }).click();
    await page.waitForURL(`${base}/antennas/field-20m`);
    expect(await page.locator('main').textContent()).toContain('Dipole at Field, meant for 20m.');
    expect(await accessibilityFaults(page)).toEqual([]);
    await page.locator('tbody a').click();
    await page.waitForURL(base + sweepPath);
    expect(complaints).toEqual([]);
  });

  it('gets the file byte for byte, and the points', async () => {
    const { page } = await openPage(await browser.newContext());
    await signIn(page, base, test.token, sweepPath);
    const file = await page.request.get(`${base}${sweepPath}/file`);
    expect((await file.body()).toString()).toBe(dipoleFile());
    expect(file.headers()['content-disposition']).toMatch(/^attachment; filename="sweep-/);
    const points = await page.request.get(`${base}${sweepPath}/points?as=csv`);
    expect((await points.text()).split('\n').length).toBeGreaterThan(41);
  });

  it('sees times in a zone of their own, and UTC without scripts', async () => {
    const zoned = await browser.newContext({ timezoneId: 'Pacific/Auckland', locale: 'en-NZ' });
    const { page } = await openPage(zoned);
    await signIn(page, base, test.token, sweepPath);
    // 12:00 UTC on 1 June is midnight in New Zealand (UTC+12 in winter; value from memory).
    expect(await page.locator('time').first().textContent()).toMatch(/2 Jun/);
    const plain = await browser.newContext({ javaScriptEnabled: false });
    const still = (await openPage(plain)).page;
    await signIn(still, base, test.token, sweepPath);
    expect(await still.locator('time').first().textContent()).toBe('1 Jun 2026, 12:00 UTC');
  });

  it('prints the sweep on one or two sheets of A4', async () => {
    const { page } = await openPage(await browser.newContext());
    await signIn(page, base, test.token, sweepPath);
    const pdf = (await page.pdf({ preferCSSPageSize: true })).toString('latin1');
    const pages = pdf.match(/\/Type\s*\/Page[^s]/g) ?? [];
    expect(pages.length).toBeGreaterThanOrEqual(1);
    expect(pages.length).toBeLessThanOrEqual(2);
  });

  it('has nothing to scroll sideways on a phone', async () => {
    const { page } = await openPage(
      await browser.newContext({ viewport: { width: 375, height: 700 } }),
    );
    await signIn(page, base, test.token, sweepPath);
    expect(await page.evaluate('document.documentElement.scrollWidth')).toBe(375);
  });
});
