/**
 * `npm run screens`: a picture of every screen of the running product, on three sizes and in both
 * themes, into `screens/`. Start the product first.
 */
const fs = require('node:fs');
const path = require('node:path');
const { ensureChromium } = require('./lib/debian');
const { ensureInstalled } = require('./lib/install');
const { runningAddress } = require('./lib/home');
const { Refusal, main, say } = require('./lib/lifecycle');
const { root } = require('./lib/paths');

const sizes = [
  { width: 390, height: 844 },
  { width: 320, height: 640 },
  { width: 1440, height: 900 },
];
const themes = ['light', 'dark'];
const roles = ['analyst', 'desk-head', 'risk-officer', 'auditor'];
const browserArgs = ['--no-sandbox', '--disable-gpu', '--disable-background-networking'];

const signIns = () =>
  JSON.parse(fs.readFileSync(path.join(root, 'server', 'seed', 'sign-ins.json'), 'utf8'));

/** Waits until nothing is loading any more, then takes the whole page. */
async function take(page, name) {
  await page.waitForLoadState('networkidle');
  await page.evaluate(() => document.fonts.ready);
  await page.screenshot({ path: path.join(root, 'screens', `${name}.png`), fullPage: true });
}

async function signIn(page, role) {
  const person = signIns().find((one) => one.role === role && one.desk === 'Commodities');
  await page.goto('/');
  await page.getByLabel('E-mail').fill(person.email);
  await page.getByLabel('Password').fill(person.password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL(/\/desks\//);
  await page.getByRole('heading', { level: 1 }).first().waitFor();
}

/** The screens of the menu, and the first record that each list leads to. */
async function walk(page, role, suffix) {
  const menu = page.getByRole('navigation', { name: 'Main' }).getByRole('link');
  const hrefs = await menu.evaluateAll((links) => links.map((link) => link.getAttribute('href')));
  for (const href of new Set(hrefs.filter((one) => one.startsWith('/desks/')))) {
    const name = `${role}-${href.split('/').at(-1)}`;
    await page.goto(href);
    await take(page, `${name}-${suffix}`);
    const record = page.locator(`main a[href^="${href}/"]`).first();
    if ((await record.count()) === 0) continue;
    await page.goto(await record.getAttribute('href'));
    await take(page, `${name}-record-${suffix}`);
  }
}

async function picture(browser, baseURL, viewport, colorScheme, role) {
  const context = await browser.newContext({ baseURL, viewport, colorScheme });
  const page = await context.newPage();
  const suffix = `${viewport.width}-${colorScheme}`;
  await page.goto('/');
  await page.getByRole('button', { name: 'Sign in' }).waitFor();
  await take(page, `sign-in-${suffix}`);
  await signIn(page, role);
  await walk(page, role, suffix);
  await context.close();
}

main(async () => {
  await ensureInstalled();
  await ensureChromium();
  const address = await runningAddress();
  if (!address) throw new Refusal('The product does not run; start it with npm start.');
  const { chromium } = require('playwright-core');
  fs.mkdirSync(path.join(root, 'screens'), { recursive: true });
  const browser = await chromium.launch({ executablePath: '/usr/bin/chromium', args: browserArgs });
  for (const role of roles)
    for (const viewport of sizes)
      for (const theme of themes) await picture(browser, address, viewport, theme, role);
  await browser.close();
  say(`Pictures are in ${path.join(root, 'screens')}.`);
  return 0;
});
