import { readFileSync } from 'node:fs';
import type { AxeResults } from 'axe-core';
import type { Page } from 'playwright-core';
import { DemoRole, Look, ServedProduct, serveProduct } from './served-product';

jest.setTimeout(240_000);

/** Evaluated, not injected as a script: the page's own policy allows none. */
const axeSource = readFileSync(require.resolve('axe-core/axe.min.js'), 'utf8');

const LOOKS: readonly Look[] = [
  { width: 1440, height: 900, theme: 'light' },
  { width: 1440, height: 900, theme: 'dark' },
  { width: 390, height: 844, theme: 'light' },
  { width: 390, height: 844, theme: 'dark' },
];

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

/** Addresses each role is looked at on; `study` and `verdict` stand for the demo's own. */
const PAGES: Readonly<Record<DemoRole, readonly string[]>> = {
  analyst: ['/', '/studies', '/studies/new', 'study', 'verdict', '/intake', 'intake', '/account'],
  lead: ['/', 'verdict', '/thresholds', '/bench', 'bench'],
  auditor: ['/', 'verdict', '/audit', '/audit/ledger'],
  administrator: ['/', '/people', '/outbox', '/bench', '/no-access?for=analyst', '/nothing-here'],
};

async function addressOf(page: Page, name: string): Promise<string> {
  if (name.startsWith('/')) return name;
  const first = async (path: string) => {
    const answer = await page.request.get(path);
    return (await answer.json()) as { items?: { id: string }[]; benches?: { id: string }[] };
  };
  switch (name) {
    case 'study':
      return `/studies/${(await first('/api/studies')).items?.at(-1)?.id}`;
    case 'intake':
      return `/intake/${(await first('/api/studies')).items?.at(-1)?.id}`;
    case 'verdict':
      return `/verdicts/${(await first('/api/verdicts')).items?.[0]?.id}`;
    default:
      return `/bench/${(await first('/api/benches')).benches?.[0]?.id}`;
  }
}

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
      const found: string[] = [];
      for (const name of names) {
        await page.goto(await addressOf(page, name));
        await page.getByRole('heading', { level: 1 }).waitFor();
        await page.waitForLoadState('networkidle');
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
