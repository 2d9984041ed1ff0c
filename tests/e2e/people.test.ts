/** The desk head’s journey: a permission is withdrawn, and the person is refused at once. */
import type { Browser, Page } from 'playwright-core';
import { accessibilityFindings, launchBrowser, phone, visit } from './support/browser';
import { deskOf, personOf, signInAs, type SignIn } from './support/people';

jest.setTimeout(180_000);

let browser: Browser;
beforeAll(async () => {
  browser = await launchBrowser();
});
afterAll(() => browser.close());

const secondAnalyst: SignIn = {
  ...personOf('analyst'),
  email: 'second-analyst@tarnfield.example',
};

const priced = (page: Page) => page.getByText('Routes agree', { exact: true }).first();

test('withdraws the permission to price and ends the withdrawal again', async () => {
  const analyst = await visit(browser, phone);
  await signInAs(analyst.page, secondAnalyst);
  await priced(analyst.page).waitFor();

  const head = personOf('desk-head');
  const { context, page, complaints } = await visit(browser, phone);
  await signInAs(page, head);
  await page.goto(`/desks/${deskOf(page)}/people`);
  await page.getByRole('link', { name: /Second analyst/ }).click();
  await page.getByRole('button', { name: 'Withdraw a permission' }).click();
  const dialog = page.getByRole('dialog', { name: 'Withdraw a permission' });
  await dialog.getByLabel('Permission').selectOption({ label: 'Price an option and save quotes' });
  await dialog.getByLabel('Last day').fill('3m');
  await dialog.getByLabel('Reason').fill('short');
  await dialog.getByRole('button', { name: 'Withdraw a permission' }).click();
  await dialog.getByText(/at least 8 characters/).waitFor();
  expect(await accessibilityFindings(page)).toEqual([]);
  await dialog.getByLabel('Reason').fill('Away on the harvest survey');
  await dialog.getByRole('button', { name: 'Withdraw a permission' }).click();
  await page.getByText('The permission is withdrawn from Second analyst.').waitFor();

  await analyst.page.getByRole('button', { name: 'Save quote' }).click();
  await analyst.page
    .getByText(/does not include this|Not part of your role|belong to other roles|saves no quotes/)
    .first()
    .waitFor();

  await page.goto(`/desks/${deskOf(page)}/changes`);
  await page.getByText('Away on the harvest survey').first().waitFor();
  await page.goto(`/desks/${deskOf(page)}/people`);
  await page.getByRole('link', { name: /Second analyst/ }).click();
  const withdrawal = page.getByText('Away on the harvest survey').first();
  await withdrawal.waitFor();
  await page.getByRole('button', { name: /^End/ }).first().click();
  const ending = page.getByRole('dialog');
  await ending.getByLabel('Reason').fill('Back from the survey');
  await ending.getByRole('button', { name: /^End/ }).click();
  await page.getByText('The single change for Second analyst has ended.').waitFor();
  expect(complaints).toEqual([]);
  await analyst.context.close();
  await context.close();
});
