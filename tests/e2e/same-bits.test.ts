/** The same request gives the same 64 bits here and in Chromium. */
import { build } from 'esbuild';
import type { Browser } from 'playwright-core';
import seedrandom from 'seedrandom';
import { price, routesFor } from '@/pricing/index';
import type { Contract, Market, PricingRequest } from '@/pricing/contract';
import { launchBrowser } from './support/browser';

const requestCount = 1000;

/** Contracts from the everyday to the strange, every method that prices them in turn. */
function randomRequests(): PricingRequest[] {
  const random = seedrandom('the same bits everywhere');
  const between = (low: number, high: number) => low + (high - low) * random();
  const pick = <Item>(items: readonly Item[]) => items[Math.floor(random() * items.length)];
  return Array.from({ length: requestCount }, (_, index) => {
    const spot = 10 ** between(-2, 4);
    const contract: Contract = {
      payoff: 'vanilla',
      exercise: pick(['european', 'american'] as const),
      kind: pick(['call', 'put'] as const),
      strike: spot * between(0.6, 1.6),
      expiry: between(0.01, 4),
    };
    const common = { spot, rate: between(-0.02, 0.12), volatility: between(0.05, 0.9) };
    const market: Market =
      index % 3 === 0 ? { ...common, carry: 'future' } : { ...common, yield: between(-0.02, 0.1) };
    const name = pick(routesFor(contract, market));
    return { contract, market, method: { name } };
  });
}

/** Every number of a value as the hexadecimal digits of its 64 bits; the rest as it stands. */
function bitsOf(value: unknown): unknown {
  if (typeof value === 'number') {
    const view = new DataView(new ArrayBuffer(8));
    view.setFloat64(0, value);
    return view.getBigUint64(0).toString(16);
  }
  if (Array.isArray(value)) return value.map(bitsOf);
  if (typeof value !== 'object' || value === null) return value;
  return Object.fromEntries(Object.entries(value).map(([name, part]) => [name, bitsOf(part)]));
}

let browser: Browser;
beforeAll(async () => {
  browser = await launchBrowser();
});
afterAll(() => browser.close());

test('1,000 random requests', async () => {
  const requests = randomRequests();
  const bundle = await build({
    stdin: {
      contents: `import { price } from './pricing/index';
        const bitsOf = ${bitsOf.toString()};
        globalThis.priceToBits = (requests) => requests.map((request) => bitsOf(price(request)));`,
      resolveDir: process.cwd(),
    },
    bundle: true,
    format: 'iife',
    write: false,
  });
  const page = await browser.newPage();
  await page.goto('about:blank');
  await page.evaluate(bundle.outputFiles[0].text);
  const inBrowser = await page.evaluate(
    (list) =>
      (globalThis as unknown as { priceToBits: (list: unknown[]) => unknown[] }).priceToBits(list),
    requests,
  );
  const here = requests.map((request) => bitsOf(price(request)));
  const priced = here.filter((result) => (result as { ok: boolean }).ok).length;
  expect(priced).toBeGreaterThan(0.9 * requestCount);
  expect(inBrowser).toEqual(here);
}, 180_000);
