/** The analyst's journey: a price on a phone, saved, and opened by others on a wide screen. */
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

jest.setTimeout(120_000);

let browser: Browser;
beforeAll(async () => {
  browser = await launchBrowser();
});
afterAll(() => browser.close());

/** The verdict of the answer itself, which stands away while a field stops the price. */
const agreement = (page: Page) => page.getByText('Routes agree', { exact: true }).first();

const shownValue = (page: Page) => page.getByTestId('answer-value').first();

/** An American put on the winter wheat future, with the market typed in. */
async function typeAmericanPut(page: Page) {
  await page.getByLabel('Underlying').selectOption({ label: await wheatLabel(page) });
  await page.getByRole('radio', { name: 'put' }).check({ force: true });
  await page.getByLabel('Exercise').selectOption({ label: 'American' });
  await page.getByLabel('Strike', { exact: true }).fill('210');
  await page.getByLabel('Expiry').fill('6m');
  await page.getByLabel('Volatility', { exact: true }).fill('24,5');
}

async function wheatLabel(page: Page): Promise<string> {
  const options = page.getByLabel('Underlying').locator('option');
  await options.first().waitFor({ state: 'attached' });
  const labels = await options.allTextContents();
  const wheat = labels.find((label) => label.startsWith('Winter wheat'));
  if (!wheat) throw new Error(`No wheat among ${labels.join(', ')}.`);
  return wheat;
}

test('an analyst prices an American put on a phone, sees three routes agree and saves it', async () => {
  const { context, page, complaints } = await visit(browser, phone);
  await signInAs(page, personOf('analyst'));
  await typeAmericanPut(page);
  await agreement(page).waitFor();
  const routes = page.getByRole('table', { name: 'Why it can be trusted' });
  expect(await routes.getByRole('row').count()).toBe(4);
  expect(await sidewaysScroll(page)).toBe(0);
  expect(await accessibilityFindings(page)).toEqual([]);

  await page.getByRole('button', { name: 'Save quote' }).click();
  await page
    .getByText(/Saved as quote Q-\d+/)
    .first()
    .waitFor();
  await page.getByText('the same 64 bits').first().waitFor();
  await page.getByRole('link', { name: 'Open the quote' }).click();
  await page.waitForURL(/\/quotes\/[0-9a-f-]{36}$/);
  const url = page.url();
  expect(await accessibilityFindings(page)).toEqual([]);
  await context.close();

  const auditor = await visit(browser, wide);
  await signInAs(auditor.page, personOf('auditor'));
  await auditor.page.goto(url);
  await auditor.page.getByText('Routes agree').first().waitFor();
  await auditor.page.getByRole('button', { name: 'Recompute', exact: true }).click();
  await auditor.page.getByText(/Equal to the bit/).waitFor();
  expect(await accessibilityFindings(auditor.page)).toEqual([]);
  expect([...complaints, ...auditor.complaints]).toEqual([]);
  await auditor.context.close();
});

test('the page is styled: an unstyled one fails here', async () => {
  const { context, page } = await visit(browser, phone);
  await signInAs(page, personOf('analyst'));
  await agreement(page).waitFor();
  const save = page.getByRole('button', { name: 'Save quote' });
  // The colour of a button that has just become ready fades in.
  await page.waitForFunction(
    (element) =>
      element !== null && getComputedStyle(element).backgroundColor === 'rgb(15, 92, 115)',
    await save.elementHandle(),
  );
  const style = await save.evaluate((element) => {
    const { fontFamily, height } = getComputedStyle(element);
    return { fontFamily, height: parseFloat(height) };
  });
  expect(style.fontFamily).toContain('Public Sans');
  expect(style.height).toBeGreaterThanOrEqual(44);
  const fontLoaded = await page.evaluate(() => document.fonts.check('16px "Public Sans"'));
  expect(fontLoaded).toBe(true);
  await context.close();
});

describe('wrong input stays at its field and loses nothing', () => {
  let page: Page;
  let close: () => Promise<void>;
  beforeAll(async () => {
    const opened = await visit(browser, phone);
    page = opened.page;
    close = () => opened.context.close();
    await signInAs(page, personOf('analyst'));
    await typeAmericanPut(page);
    await agreement(page).waitFor();
  });
  afterAll(() => close());

  test.each([
    ['Strike', '', /Enter a strike/],
    ['Strike', '-5', /more than zero/],
    ['Strike', '0', /more than zero/],
    ['Strike', '1e300', /./],
    ['Strike', 'two hundred', /./],
    ['Strike', '1,234.5', /./],
    ['Expiry', '2020-01-01', /has passed/],
    ['Expiry', 'soon', /neither a date nor a tenor/],
    ['Expiry', '2027-02-30', /no 2027-02-30 in the calendar/],
    ['Volatility', '0', /more than zero/],
    ['Volatility', 'NaN', /./],
  ])('%s %j', async (label, typed, sentence) => {
    const field = page.getByLabel(label, { exact: true });
    const good = await field.inputValue();
    await field.fill(typed);
    await page.locator('[aria-invalid="true"]').waitFor();
    expect(await field.getAttribute('aria-invalid')).toBe('true');
    const described = await field.getAttribute('aria-describedby');
    const errorId = described?.split(' ').find((id) => id.endsWith('-error'));
    const message = await page.locator(`[id="${errorId}"]`).textContent();
    expect(message).toMatch(sentence);
    expect(await field.inputValue()).toBe(typed);
    await field.fill(good);
    await page.locator('[aria-invalid="true"]').waitFor({ state: 'detached' });
    await agreement(page).waitFor();
  });
});

test('what was typed survives a reload', async () => {
  const { context, page } = await visit(browser, phone);
  await signInAs(page, personOf('analyst'));
  await typeAmericanPut(page);
  await page.getByLabel('Strike', { exact: true }).fill('207.25');
  await agreement(page).waitFor();
  await page.reload();
  await agreement(page).waitFor();
  expect(await page.getByLabel('Strike', { exact: true }).inputValue()).toBe('207.25');
  await context.close();
});

test('a session that has ended asks for the password over the ticket, then saves', async () => {
  const { context, page } = await visit(browser, phone);
  const person = personOf('analyst');
  await signInAs(page, person);
  await typeAmericanPut(page);
  await page.getByLabel('Strike', { exact: true }).fill('208.5');
  await agreement(page).waitFor();
  // Ended from elsewhere: the cookie is gone and the server knows the session no more.
  const ended = await page.request.delete('/api/v1/sessions/current', {
    headers: { origin: new URL(page.url()).origin },
  });
  expect(ended.ok()).toBe(true);
  await page.getByRole('button', { name: 'Save quote' }).click();
  const dialog = page.getByRole('dialog', { name: 'Sign in again' });
  await dialog.getByLabel('Password').fill(person.password);
  await dialog.getByRole('button', { name: 'Sign in' }).click();
  await page
    .getByText(/Saved as quote Q-\d+/)
    .first()
    .waitFor();
  expect(await page.getByLabel('Strike', { exact: true }).inputValue()).toBe('208.5');
  await context.close();
});

test('with the server gone the worker goes on pricing, and a quote is kept and sent once', async () => {
  const { context, page } = await visit(browser, phone);
  await signInAs(page, personOf('analyst'));
  await typeAmericanPut(page);
  await agreement(page).waitFor();
  await page.route('**/api/**', (route) => route.abort());
  await page.getByLabel('Strike', { exact: true }).fill('205');
  await agreement(page).waitFor();
  const before = await shownValue(page).textContent();
  await page.getByLabel('Strike', { exact: true }).fill('215');
  await shownValue(page)
    .filter({ hasNotText: before ?? '' })
    .waitFor();
  await agreement(page).waitFor();
  await page.getByRole('button', { name: 'Save quote' }).click();
  await page
    .getByText(/kept on this device/)
    .first()
    .waitFor();
  await page.unroute('**/api/**');
  await page.reload();
  await page
    .getByText(/kept on this device/)
    .first()
    .waitFor();
  await page.getByRole('button', { name: 'Retry' }).click();
  await page
    .getByText(/Saved as quote Q-\d+/)
    .first()
    .waitFor();
  const desk = deskOf(page);
  await page.goto(`/desks/${desk}/quotes`);
  await page.getByText('215').first().waitFor();
  await context.close();
});
