/** From a quote to a live trade: proposed on a phone, returned, amended, approved by someone else. */
import type { Browser, Page } from 'playwright-core';
import {
  accessibilityFindings,
  launchBrowser,
  phone,
  sidewaysScroll,
  visit,
  wide,
} from './support/browser';
import { deskOf, personOf, signInAs } from './support/people';

jest.setTimeout(300_000);

let browser: Browser;
beforeAll(async () => {
  browser = await launchBrowser();
});
afterAll(() => browser.close());

async function expectSound(page: Page) {
  expect(await accessibilityFindings(page)).toEqual([]);
  expect(await sidewaysScroll(page)).toBe(0);
}

const act = (page: Page, name: string) => page.getByRole('button', { name, exact: true });
const inDialog = (page: Page) => page.getByRole('dialog');

/** Proposes on the newest quote of winter wheat; gives the page of the trade. */
async function propose(page: Page): Promise<string> {
  await page.goto(`/desks/${deskOf(page)}/quotes?search=WHEAT`);
  await page.getByRole('link', { name: /^Q-/ }).first().click();
  await page.getByRole('link', { name: 'Propose trade' }).click();
  await act(page, 'Propose trade').click();
  await page.getByText('Say whom the trade is with.').waitFor();
  await expectSound(page);
  await page.getByLabel('Book').selectOption({ index: 1 });
  await page.getByLabel('Counterparty').fill('Larkrise Cooperative');
  await page.getByLabel('Premium', { exact: true }).fill('1.5k');
  await act(page, 'Propose trade').click();
  await page.waitForURL(/\/trades\/[0-9a-f-]{36}$/);
  await page.getByText('1\u00a0500.00\u00a0EUR', { exact: false }).first().waitFor();
  await expectSound(page);
  return page.url();
}

test('a trade is proposed, returned, amended and approved, never by one’s own hand', async () => {
  const analyst = await visit(browser, phone);
  await signInAs(analyst.page, personOf('analyst'));
  const address = await propose(analyst.page);
  expect(await act(analyst.page, 'Approve').count()).toBe(0);

  const head = await visit(browser, phone);
  await signInAs(head.page, personOf('desk-head'));
  await head.page.goto(`/desks/${deskOf(head.page)}/books`);
  await head.page.getByText('Waiting for approval').waitFor();
  await expectSound(head.page);
  const title = await analyst.page.getByRole('heading', { level: 1 }).innerText();
  const [number] = /T-\d+/.exec(title) ?? [''];
  await head.page.getByRole('link', { name: new RegExp(number) }).click();
  await act(head.page, 'Return').click();
  await inDialog(head.page).getByLabel('Reason').fill('The premium was agreed in lots');
  await expectSound(head.page);
  await inDialog(head.page).getByRole('button', { name: 'Return', exact: true }).click();
  await head.page.getByText(`Trade ${number} is returned.`).waitFor();

  await analyst.page.reload();
  await analyst.page.getByText('The premium was agreed in lots').first().waitFor();
  await analyst.page.getByRole('link', { name: 'Amend', exact: true }).click();
  await analyst.page.getByLabel('Premium', { exact: true }).fill('1750');
  await analyst.page.getByLabel('Why it is amended').fill('As agreed, counted in lots');
  await expectSound(analyst.page);
  await act(analyst.page, 'Propose the amendment').click();
  await analyst.page.waitForURL(address);
  await analyst.page.getByRole('heading', { name: 'What the new version changes' }).waitFor();

  await head.page.reload();
  await act(head.page, 'Approve').click();
  await inDialog(head.page)
    .getByText(/come into force/)
    .waitFor();
  await inDialog(head.page).getByRole('button', { name: 'Approve', exact: true }).click();
  await head.page.getByText(`Trade ${number} is approved.`).waitFor();
  await head.page.getByText('live', { exact: true }).first().waitFor();
  await expectSound(head.page);

  expect([...analyst.complaints, ...head.complaints]).toEqual([]);
  await analyst.context.close();
  await head.context.close();
});

test('a book is sorted, filtered and searched in its address, by everyone who reads', async () => {
  const { context, page, complaints } = await visit(browser, wide, 'dark');
  await signInAs(page, personOf('auditor'));
  await page.goto(`/desks/${deskOf(page)}/books/all`);
  const first = page.getByRole('row').nth(1).getByRole('link').first();
  await first.waitFor();
  await page.getByRole('button', { name: 'expires' }).click();
  await page.waitForURL(/sort=expiry/);
  await page.getByLabel('Status').selectOption('live');
  await page.waitForURL(/status=live/);
  await page.getByLabel('Search').fill('mill');
  await page.waitForURL(/search=mill/);
  await page.reload();
  await first.waitFor();
  expect(await page.getByRole('columnheader', { name: 'expires' }).getAttribute('aria-sort')).toBe(
    'ascending',
  );
  expect(await page.getByLabel('Search').inputValue()).toBe('mill');
  await expectSound(page);
  await first.click();
  await page.getByText('Time line').waitFor();
  expect(await page.getByRole('link', { name: 'Amend' }).count()).toBe(0);
  await expectSound(page);
  expect(complaints).toEqual([]);
  await context.close();
});
