/**
 * The main job as its people do it: a quote becomes a trade, the day’s close is approved, a run
 * values the book, an exception is studied and answered, the run is signed off, an auditor takes the
 * file away and verifies it, and a permission that is withdrawn holds at once.
 */
import { execFile } from 'node:child_process';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import type { Browser, Download, Locator, Page } from 'playwright-core';
import {
  accessibilityFindings,
  launchBrowser,
  phone,
  sidewaysScroll,
  visit,
  wide,
  type Visit,
} from './support/browser';
import { deskOf, personOf, signInAs, type SignIn } from './support/people';

jest.setTimeout(600_000);

const root = path.join(__dirname, '..', '..');
const secondOfficer: SignIn = {
  ...personOf('risk-officer'),
  email: 'second-risk-officer@tarnfield.example',
};
const secondAnalyst: SignIn = {
  ...personOf('analyst'),
  email: 'second-analyst@tarnfield.example',
};
const bookCode = 'FREIGHT-EQ';

/** A run or a study of a few dozen rows on a machine that does other things as well. */
const workTimeoutMs = 120_000;

let browser: Browser;
let folder: string;
const visits: Visit[] = [];

beforeAll(async () => {
  browser = await launchBrowser();
  folder = fs.mkdtempSync(path.join(os.tmpdir(), 'driftless-e2e-'));
});
afterAll(async () => {
  await browser.close();
  fs.rmSync(folder, { recursive: true, force: true });
});

async function arrive(person: SignIn, viewport: typeof phone): Promise<Page> {
  const arrived = await visit(browser, viewport);
  visits.push(arrived);
  await signInAs(arrived.page, person);
  return arrived.page;
}

const open = (page: Page, where: string) => page.goto(`/desks/${deskOf(page)}/${where}`);
const act = (within: Page | Locator, name: string) =>
  within.getByRole('button', { name, exact: true });
const inDialog = (page: Page) => page.getByRole('dialog');

async function expectSound(page: Page) {
  expect(await accessibilityFindings(page)).toEqual([]);
  expect(await sidewaysScroll(page)).toBe(0);
}

/** The close that waits for approval, by its day. */
async function findWaitingClose(page: Page): Promise<string> {
  await open(page, 'market-data?status=draft');
  const link = page.getByRole('main').getByRole('link', { name: /^\d{4}-\d{2}-\d{2}/ });
  await link.first().click();
  await act(page, 'Approve').waitFor();
  const [date] = /\d{4}-\d{2}-\d{2}/.exec(
    await page.getByRole('heading', { level: 1 }).innerText(),
  ) ?? [''];
  return date;
}

/** Prices, saves and proposes on a phone, agreed on the day of the close; gives the number. */
async function proposeTrade(page: Page, date: string): Promise<string> {
  const underlying = page.getByLabel('Underlying');
  const freight = underlying.locator('option', { hasText: 'FREIGHT-Q1' });
  await freight.waitFor({ state: 'attached' });
  await underlying.selectOption({ label: await freight.innerText() });
  await page.getByLabel('Strike', { exact: true }).fill('1500');
  await page.getByLabel('Expiry').fill('5m');
  await page.getByText('Routes agree', { exact: true }).first().waitFor();
  await act(page, 'Save quote').click();
  await page.getByRole('link', { name: 'Open the quote' }).click();
  await page.getByRole('link', { name: 'Propose trade' }).click();
  const books = page.getByLabel('Book');
  const book = books.locator('option', { hasText: bookCode });
  await book.waitFor({ state: 'attached' });
  await books.selectOption({ label: await book.innerText() });
  await page.getByLabel('Counterparty').fill('Larkrise Carriers');
  await page.getByLabel('Agreed at').fill(`${date} 10:05`);
  await act(page, 'Propose trade').click();
  await page.waitForURL(/\/trades\/[0-9a-f-]{36}$/);
  await expectSound(page);
  const [number] = /T-\d+/.exec(await page.getByRole('heading', { level: 1 }).innerText()) ?? [''];
  return number;
}

async function approveTrade(page: Page, number: string) {
  await open(page, 'books');
  await page.getByRole('link', { name: new RegExp(number) }).click();
  await act(page, 'Approve').click();
  await act(inDialog(page), 'Approve').click();
  await page.getByText(`Trade ${number} is approved.`).waitFor();
  await expectSound(page);
}

async function approveClose(page: Page) {
  await act(page, 'Approve').click();
  const confirmation = inDialog(page).getByLabel('I have looked at each of these');
  if ((await confirmation.count()) > 0) {
    await act(inDialog(page), 'Approve').click();
    await inDialog(page).getByText('Look at the unlikely numbers and confirm them.').waitFor();
    await confirmation.check({ force: true });
  }
  await act(inDialog(page), 'Approve').click();
  await page.getByText('approved', { exact: true }).first().waitFor();
  await expectSound(page);
}

/** Starts the run on the latest close and watches it to its end; gives its address. */
async function startRun(page: Page): Promise<string> {
  await open(page, 'runs');
  await page.getByRole('link', { name: 'Start a run' }).click();
  await page.getByLabel(new RegExp(bookCode)).check({ force: true });
  await expectSound(page);
  await act(page, 'Start the run').click();
  await page.waitForURL(/\/runs\/[0-9a-f-]{36}$/);
  const outcome = page.getByRole('heading', { level: 1, name: /agree/ });
  await outcome.waitFor({ timeout: workTimeoutMs });
  // As whoever comes later finds it: rows that still arrive would move what is looked at.
  await page.reload();
  await outcome.waitFor();
  await page.waitForLoadState('networkidle');
  await expectSound(page);
  return page.url();
}

const openExceptions = (page: Page) => page.getByRole('button', { name: 'Write a note' });

/** Studies the gravest exception from where it stands; gives the address of the study. */
async function studyFirst(page: Page): Promise<string> {
  await page.getByRole('link', { name: 'Start a study' }).first().click();
  await page.getByText('Priced on an approved close').waitFor();
  await page.getByLabel('Rows in each ladder').selectOption('4');
  await act(page, 'Start the study').click();
  await page.waitForURL(/\/studies\/[0-9a-f-]{36}$/);
  await page.getByText('to be decided').first().waitFor({ timeout: workTimeoutMs });
  await expectSound(page);
  return page.url();
}

async function signOffStudy(page: Page, address: string) {
  await page.goto(address);
  await page.getByLabel('Comment').fill('The orders are those of the schemes');
  await act(page, 'Sign off').click();
  await page.getByText(/^Signed off by/).waitFor();
}

async function answerByStudy(page: Page) {
  await act(page, 'Answer by a study').first().click();
  await inDialog(page).getByLabel('Study').selectOption({ index: 1 });
  await inDialog(page).getByLabel('What it shows').fill('Both routes go to one value');
  await expectSound(page);
  await act(inDialog(page), 'Answer by a study').click();
  await page.getByText('Answered by study').first().waitFor();
}

async function answerOthers(page: Page) {
  for (let left = await openExceptions(page).count(); left > 0; left -= 1) {
    await openExceptions(page).first().click();
    await inDialog(page).getByLabel('Reason').fill('Small beside the tolerance of the book');
    await act(inDialog(page), 'Write a note').click();
    await inDialog(page).waitFor({ state: 'detached' });
    await openExceptions(page)
      .nth(left - 1)
      .waitFor({ state: 'detached' });
  }
}

async function signOffRun(page: Page, address: string) {
  await page.goto(address);
  await act(page, 'Sign off').click();
  await inDialog(page).getByLabel('Comment').fill('Everything was looked into and answered');
  await act(inDialog(page), 'Sign off').click();
  await page
    .getByText(/^Signed off by/)
    .first()
    .waitFor();
  await expectSound(page);
}

async function save(download: Promise<Download>): Promise<string> {
  const file = await download;
  const target = path.join(folder, file.suggestedFilename());
  await file.saveAs(target);
  return target;
}

/** Clicks and keeps what the browser is given to save. */
async function saved(page: Page, button: string): Promise<string> {
  const download = page.waitForEvent('download');
  await act(page, button).click();
  return save(download);
}

/** What the verifier of the checkout says, without network; a file that was changed ends it with 1. */
function verdictOn(file: string, manifest: string, key: string): Promise<string> {
  const args = [path.join(root, 'scripts', 'verify.js'), file, manifest, '--key', key];
  return new Promise((resolve) => {
    execFile(process.execPath, args, { cwd: root }, (_error, stdout) => resolve(stdout));
  });
}

async function takeFileAway(page: Page, number: string) {
  await open(page, `history?trade=${number}`);
  await page.getByText(number).first().waitFor();
  await act(page, 'Export XLSX').click();
  await act(page, 'Save the file').waitFor({ timeout: workTimeoutMs });
  const file = await saved(page, 'Save the file');
  const manifest = await saved(page, 'Save the manifest');
  await expectSound(page);
  await open(page, 'chain');
  const key = await saved(page, 'Save the public key');
  return { file, manifest, key };
}

/** A grant that is ended stops the very next act of whoever holds it. */
async function exportUntilWithdrawn(head: Page) {
  const holder = await arrive(secondAnalyst, phone);
  await open(holder, 'history');
  await act(holder, 'Export CSV').waitFor();
  await open(head, 'people');
  await head.getByRole('link', { name: /Second analyst/ }).click();
  await head.getByRole('button', { name: /^End/ }).first().click();
  await inDialog(head).getByLabel('Reason').fill('The review is finished');
  await inDialog(head).getByRole('button', { name: /^End/ }).click();
  await head.getByText('The single change for Second analyst has ended.').waitFor();
  await act(holder, 'Export CSV').click();
  await holder.getByText(/^Refused, and no longer offered: Export the valuation history/).waitFor();
  await expectSound(holder);
}

test('from a quote to a verified file, and a permission that ends', async () => {
  const officer = await arrive(personOf('risk-officer'), wide);
  const date = await findWaitingClose(officer);
  const analyst = await arrive(personOf('analyst'), phone);
  const number = await proposeTrade(analyst, date);
  const head = await arrive(personOf('desk-head'), phone);
  await approveTrade(head, number);
  await approveClose(officer);

  const runAddress = await startRun(analyst);
  await head.reload();
  await head.getByText(`on the close of ${date}`).first().waitFor();
  await officer.goto(runAddress);
  const studyAddress = await studyFirst(officer);
  const second = await arrive(secondOfficer, wide);
  await signOffStudy(second, studyAddress);
  await officer.goto(runAddress);
  await answerByStudy(officer);
  await answerOthers(officer);
  await signOffRun(second, runAddress);

  const auditor = await arrive(personOf('auditor'), wide);
  const { file, manifest, key } = await takeFileAway(auditor, number);
  const whole = 'The file is the one that was signed.';
  expect(await verdictOn(file, manifest, key)).toContain(whole);
  const bytes = fs.readFileSync(file);
  bytes[bytes.length >> 1] ^= 1;
  fs.writeFileSync(file, bytes);
  expect(await verdictOn(file, manifest, key)).toMatch(/was changed/);
  await act(auditor, 'Verify from the first entry').first().click();
  await auditor
    .getByText(/entries are in order/)
    .first()
    .waitFor({ timeout: workTimeoutMs });
  await expectSound(auditor);
  expect(visits.flatMap(({ complaints }) => complaints)).toEqual([]);

  await exportUntilWithdrawn(head);
  const refused = [expect.stringContaining('403')];
  expect(visits.flatMap(({ complaints }) => complaints)).toEqual(refused);
});
