/** What a phone has to load before the first screen can be used. */
import { gzipSync } from 'node:zlib';
import type { Browser } from 'playwright-core';
import { launchBrowser, phone, visit } from './support/browser';

jest.setTimeout(60_000);

const budgetBytes = 350_000;

let browser: Browser;
beforeAll(async () => {
  browser = await launchBrowser();
});
afterAll(() => browser.close());

test('the scripts of the first route are within 350 kB, gzipped', async () => {
  const { context, page } = await visit(browser, phone);
  const weights: Promise<number>[] = [];
  page.on('response', (response) => {
    if (new URL(response.url()).pathname.endsWith('.js'))
      weights.push(response.body().then((body) => gzipSync(body).length));
  });
  await page.goto('/');
  await page.getByRole('button', { name: 'Sign in' }).waitFor();
  await page.waitForLoadState('networkidle');
  const sizes = await Promise.all(weights);
  expect(sizes.length).toBeGreaterThan(0);
  expect(sizes.reduce((sum, size) => sum + size, 0)).toBeLessThanOrEqual(budgetBytes);
  await context.close();
});
