import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import {
  accessibilityFaults,
  browserPath,
  listen,
  openBrowser,
  openPage,
  signIn,
} from '../support/browser.ts';
import { addAntenna } from '../support/club-records.ts';
import { dipoleFile } from '../support/dipole-file.ts';
import { addMember } from '../support/members.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

/** Delimited text whose header does not say what its columns hold: resistance and reactance. */
const unnamed = (first: string) =>
  `F,A,B\n13.9,${first},-90\n14.0,41,-60\n14.1,42,-30\n14.2,43,2\n14.3,44,30\n`;

describe.skipIf(browserPath === undefined).each([
  ['with scripts', true],
  ['without scripts', false],
])('a member who uploads %s', (_, javaScriptEnabled) => {
  let test: TestApp;
  let base: string;
  let browser: Browser;
  let page: Page;
  let complaints: string[];

  beforeAll(async () => {
    test = await makeTestApp();
    await addAntenna(test);
    base = await listen(test);
    browser = await openBrowser();
    const context = await browser.newContext({ javaScriptEnabled, timezoneId: 'Asia/Tokyo' });
    ({ page, complaints } = await openPage(context));
    await signIn(page, base, test.token, '/upload');
  });
  afterAll(async () => {
    await browser?.close();
    await test.close();
  });

  const send = async (name: string, text: string) => {
    await page.goto(`${base}/upload`);
    const buffer = Buffer.from(text);
    await page.getByLabel('File').setInputFiles({ name, mimeType: 'text/plain', buffer });
    await page.getByRole('button', { name: 'Upload' }).click();
  };
  const arrives = (arrival: string) =>
    page.waitForURL((url) => url.pathname.startsWith('/sweeps/') && url.search === arrival);

  it('sees the result of a good file at once, and its time as it was told', async () => {
    await page.goto(`${base}/upload`);
    await page.getByLabel(/When it was measured/).fill('2026-05-17T14:30');
    const buffer = Buffer.from(dipoleFile());
    await page.getByLabel('File').setInputFiles({ name: 'a.s1p', mimeType: 'text/plain', buffer });
    await page.getByRole('button', { name: 'Upload' }).click();
    await arrives('?arrival=kept');
    expect(await page.getByRole('status').textContent()).toContain('Kept.');
    const id = new URL(page.url()).pathname.split('/')[2];
    const record = (await test.call({ url: `/v1/sweeps/${id}` })).json();
    // Japan is nine hours ahead of UTC all year (value from memory); without a script it is UTC.
    const hour = javaScriptEnabled ? '05' : '14';
    expect(record.measured_at).toBe(`2026-05-17T${hour}:30:00.000Z`);
    expect(record.file.name).toBe('a.s1p');
  });

  it('is shown the first record where the file is kept already', async () => {
    await send('again.s1p', dipoleFile());
    await arrives('?arrival=known');
  });

  it('is asked what the columns hold, and is answered', async () => {
    await send('bench.csv', unnamed('40'));
    const heading = page.getByRole('heading', { name: 'What the columns hold' });
    await heading.waitFor();
    expect(await page.getByLabel('Column 1').inputValue()).toBe('frequency:MHz');
    expect(await page.getByRole('cell', { name: '13.9' }).count()).toBe(1);
    if (javaScriptEnabled) expect(await accessibilityFaults(page)).toEqual([]);
    await page.getByLabel('Column 2').selectOption('resistance');
    await page.getByLabel('Column 3').selectOption('reactance');
    await page.getByRole('button', { name: 'Upload with these columns' }).click();
    await arrives('?arrival=kept');
    const id = new URL(page.url()).pathname.split('/')[2];
    const { file } = (await test.call({ url: `/v1/sweeps/${id}` })).json();
    expect(file).toMatchObject({
      name: 'bench.csv',
      columns: 'frequency:MHz,resistance,reactance',
    });
  });

  it('keeps the question where the answer does not fit the file', async () => {
    await send('bench.csv', unnamed('39'));
    await page.getByLabel('Column 2').selectOption('swr');
    await page.getByLabel('Column 3').selectOption('return_loss');
    await page.getByRole('button', { name: 'Upload with these columns' }).click();
    await page.getByRole('alert').waitFor();
    expect(await page.getByLabel('Column 2').inputValue()).toBe('swr');
    expect(await page.getByRole('cell', { name: '13.9' }).count()).toBe(1);
  });

  it('is told what is wrong with a bad file, and where', async () => {
    await send('broken.s1p', '# MHz S RI R 50\n14.0 0.1 0.2\n14.1 0.1 x\n');
    const alert = page.getByRole('alert');
    await alert.waitFor();
    expect(await alert.textContent()).toContain('line 3');
    if (javaScriptEnabled) expect(await accessibilityFaults(page)).toEqual([]);
    expect(complaints).toEqual([]);
  });

  it('who may only read is told so', async () => {
    const { token } = await addMember(test, 'reader');
    const reader = (await openPage(await browser.newContext({ javaScriptEnabled }))).page;
    await signIn(reader, base, token, '/upload');
    const buffer = Buffer.from(dipoleFile('another'));
    await reader
      .getByLabel('File')
      .setInputFiles({ name: 'b.s1p', mimeType: 'text/plain', buffer });
    await reader.getByRole('button', { name: 'Upload' }).click();
    await reader.getByRole('alert').waitFor();
    expect(await reader.getByRole('alert').textContent()).toContain('right');
  });
});

describe.skipIf(browserPath === undefined)('a file that is dropped on the form', () => {
  it('is the file that is sent', async () => {
    const test = await makeTestApp();
    await addAntenna(test);
    const base = await listen(test);
    const browser = await openBrowser();
    const { page } = await openPage(await browser.newContext());
    await signIn(page, base, test.token, '/upload');
    await page.evaluate(`{
      const files = new DataTransfer();
      files.items.add(new File([${JSON.stringify(dipoleFile())}], 'dropped.s1p'));
      document.querySelector('form.upload')
        .dispatchEvent(new DragEvent('drop', { dataTransfer: files, cancelable: true, bubbles: true }));
    }`);
    await page.getByRole('button', { name: 'Upload' }).click();
    await page.waitForURL(/arrival=kept/);
    expect(await page.locator('main').textContent()).toContain('dropped.s1p');
    await browser.close();
    await test.close();
  });
});
