/** Debian's Chromium, driven the way a person would: one browser a file, one context a person. */
import axeCore from 'axe-core';
import { chromium, type Browser, type BrowserContext, type Page } from 'playwright-core';

export const phone = { width: 390, height: 844 };
export const wide = { width: 1440, height: 900 };

export const baseUrl = (): string => {
  const url = process.env.E2E_BASE_URL;
  if (!url) throw new Error('E2E_BASE_URL names the running product; `npm test` sets it.');
  return url;
};

/** Root needs --no-sandbox; the rest keeps Chromium from looking for hosts of its own. */
const args = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

export const launchBrowser = (): Promise<Browser> =>
  chromium.launch({ executablePath: '/usr/bin/chromium', args });

/** Far more than a healthy page takes; a missing thing is reported before the test's own limit. */
const actionTimeoutMs = 15_000;

/** More than any bar that stands over the foot of a page. */
const bottomBarHeight = 200;

export type Visit = { context: BrowserContext; page: Page; complaints: string[] };

/**
 * A new person at the door. Whatever the console or the page complains of is gathered, so that a
 * test can assert that nothing did.
 */
export async function visit(
  browser: Browser,
  viewport: { width: number; height: number },
  colorScheme: 'light' | 'dark' = 'light',
): Promise<Visit> {
  const context = await browser.newContext({ viewport, colorScheme, baseURL: baseUrl() });
  context.setDefaultTimeout(actionTimeoutMs);
  const page = await context.newPage();
  const complaints: string[] = [];
  page.on('pageerror', (error) => complaints.push(error.message));
  page.on('console', (message) => {
    if (message.type() === 'error') complaints.push(message.text());
  });
  return { context, page, complaints };
}

/** As it stands on the page, where `accessibilityFindings` puts it; no page of ours has frames. */
declare const axe: typeof axeCore;

const accessibilityTags = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'];

/**
 * Violations of WCAG 2.2 A and AA on the page as it stands, one line each. The whole page is laid
 * open for it: what only lies under the bottom bar until one scrolls is no finding.
 */
export async function accessibilityFindings(page: Page): Promise<string[]> {
  const viewport = page.viewportSize();
  const height = await page.evaluate(() => document.documentElement.scrollHeight);
  if (viewport) await page.setViewportSize({ ...viewport, height: height + bottomBarHeight });
  await page.evaluate(axeCore.source);
  const violations = await page.evaluate(async (tags) => {
    const found = await axe.run({ runOnly: tags, resultTypes: ['violations'] });
    return found.violations.map(({ id, nodes }) => ({
      id,
      targets: nodes.map(({ target }) => target.join(' ')),
    }));
  }, accessibilityTags);
  if (viewport) await page.setViewportSize(viewport);
  return violations.map(({ id, targets }) => `${id}: ${targets.join(', ')}`);
}

/** How far the page scrolls sideways, in pixels. */
export const sidewaysScroll = (page: Page): Promise<number> =>
  page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth);
