import { readFileSync } from 'node:fs';
import type { AxeResults } from 'axe-core';
import type { Page } from 'playwright-core';
import { LOOKS, PAGES, leaveQuietly, openPage } from './pages';
import { DemoRole, ServedProduct, serveProduct } from './served-product';

jest.setTimeout(240_000);

/** Evaluated, not injected as a script: the page's own policy allows none. */
const axeSource = readFileSync(require.resolve('axe-core/axe.min.js'), 'utf8');

let product: ServedProduct;
beforeAll(async () => {
  product = await serveProduct();
});
afterAll(() => product.stop());

async function violations(page: Page): Promise<string[]> {
  await page.evaluate(axeSource);
  const results = await page.evaluate(() =>
    (globalThis as unknown as { axe: { run(): Promise<AxeResults> } }).axe.run(),
  );
  return results.violations.map(
    ({ id, nodes }) => `${id}: ${nodes.map(({ html }) => html.slice(0, 120)).join(' | ')}`,
  );
}

const runsOver = (page: Page): Promise<boolean> =>
  page.evaluate(() => document.documentElement.scrollWidth > document.documentElement.clientWidth);

describe.each(LOOKS)('$width px, $theme', (look) => {
  it('sign-in has no violation', async () => {
    const page = await product.visitor(look);
    await page.getByRole('button', { name: 'Sign in', exact: true }).waitFor();
    expect(await violations(page)).toEqual([]);
    expect(await runsOver(page)).toBe(false);
    await page.context().close();
  });

  it.each(Object.entries(PAGES) as [DemoRole, readonly string[]][])(
    'no page of the %s has a violation or scrolls sideways',
    async (role, names) => {
      const page = await product.signedIn(role, look);
      leaveQuietly(page);
      const found: string[] = [];
      for (const name of names) {
        await openPage(page, name);
        for (const violation of await violations(page)) found.push(`${name} ${violation}`);
        if (await runsOver(page)) found.push(`${name} scrolls sideways`);
      }
      expect(found).toEqual([]);
      await page.context().close();
    },
  );
});

it('no page complained on the console', () => {
  expect(product.complaints).toEqual([]);
});
