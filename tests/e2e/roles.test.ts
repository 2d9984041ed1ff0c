/** Each role signs in, opens every screen it is offered, and is refused what it may not do. */
import type { Browser, Page } from 'playwright-core';
import { deskRoles, type DeskRole } from '@/shared/permissions';
import {
  accessibilityFindings,
  launchBrowser,
  phone,
  sidewaysScroll,
  visit,
  wide,
} from './support/browser';
import { deskOf, personOf, signInAs } from './support/people';

jest.setTimeout(240_000);

let browser: Browser;
beforeAll(async () => {
  browser = await launchBrowser();
});
afterAll(() => browser.close());

const menu = (page: Page) => page.getByRole('navigation', { name: 'Main' });

async function settle(page: Page) {
  await page.getByRole('heading', { level: 1 }).first().waitFor();
  await page.waitForLoadState('networkidle');
}

/** Opens each screen of the menu in turn and looks for what no screen may have. */
async function walkMenu(page: Page): Promise<string[]> {
  const entries = menu(page).getByRole('link');
  const addresses = new Set<string>();
  for (const entry of await entries.all()) {
    const address = await entry.getAttribute('href');
    if (address?.startsWith('/desks/')) addresses.add(address);
  }
  const findings: string[] = [];
  for (const address of addresses) {
    await page.goto(address);
    await settle(page);
    const found = await accessibilityFindings(page);
    if ((await sidewaysScroll(page)) > 0) found.push('scrolls sideways');
    findings.push(...found.map((finding) => `${address}: ${finding}`));
  }
  expect(addresses.size).toBeGreaterThanOrEqual(3);
  return findings;
}

/** A small phone in the dark and a wide screen in the light: both themes, both layouts. */
const looks = [
  { viewport: { ...phone, width: 320 }, scheme: 'dark' },
  { viewport: wide, scheme: 'light' },
] as const;

describe.each(deskRoles.map((role) => [role] as const))('%s', (role: DeskRole) => {
  test.each(looks)('finds every screen whole, $viewport.width wide, $scheme', async (look) => {
    const { context, page, complaints } = await visit(browser, look.viewport, look.scheme);
    await signInAs(page, personOf(role));
    await settle(page);
    expect(await walkMenu(page)).toEqual([]);
    expect(complaints).toEqual([]);
    await context.close();
  });
});

test('the sign-in page is whole in both themes', async () => {
  for (const { viewport, scheme } of looks) {
    const { context, page, complaints } = await visit(browser, viewport, scheme);
    await page.goto('/');
    await page.getByRole('button', { name: 'Sign in' }).waitFor();
    expect(await accessibilityFindings(page)).toEqual([]);
    expect(await sidewaysScroll(page)).toBe(0);
    expect(complaints).toEqual([]);
    await context.close();
  }
});

test('a wrong password is refused in words, at the form, and the e-mail stays', async () => {
  const { context, page } = await visit(browser, phone);
  await page.goto('/');
  await page.getByLabel('E-mail').fill('nobody@tarnfield.example');
  await page.getByLabel('Password').fill('not the right one');
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.getByText('E-mail or password is not right.').waitFor();
  expect(await page.getByLabel('E-mail').inputValue()).toBe('nobody@tarnfield.example');
  await context.close();
});

test('an auditor is offered no ticket, and its address says why', async () => {
  const { context, page } = await visit(browser, wide);
  await signInAs(page, personOf('auditor'));
  await settle(page);
  expect(await menu(page).getByRole('link', { name: 'Ticket' }).count()).toBe(0);
  await page.goto(`/desks/${deskOf(page)}/ticket`);
  await page.getByText('Not part of your role here').waitFor();
  await context.close();
});

test('an analyst sees people but may change nobody', async () => {
  const { context, page } = await visit(browser, wide);
  await signInAs(page, personOf('analyst'));
  await page.goto(`/desks/${deskOf(page)}/people`);
  await page.getByRole('link', { name: /Second analyst/ }).click();
  await page.getByRole('heading', { level: 1, name: 'Second analyst' }).waitFor();
  expect(
    await page.getByRole('button', { name: /Suspend|Grant|Withdraw|Change role/ }).count(),
  ).toBe(0);
  await context.close();
});

test('a desk of others is closed', async () => {
  const treasury = await visit(browser, wide);
  await signInAs(treasury.page, personOf('analyst', 'Treasury'));
  const theirs = deskOf(treasury.page);
  await treasury.context.close();
  const { context, page } = await visit(browser, wide);
  await signInAs(page, personOf('analyst'));
  await page.goto(`/desks/${theirs}/quotes`);
  await page.getByText('Not your desk').waitFor();
  await context.close();
});
