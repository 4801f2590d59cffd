/**
 * Pictures of every page for its role, at both widths and in both themes, for people to look at:
 * `npx tsx test/e2e/pictures.ts FOLDER [part of a page's name]`. Needs the built product.
 */
import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { LOOKS, PAGES, leaveQuietly, openPage } from './pages';
import { DemoRole, serveProduct } from './served-product';

async function takePictures(folder: string, only: string): Promise<void> {
  mkdirSync(folder, { recursive: true });
  const product = await serveProduct();
  try {
    for (const look of LOOKS)
      for (const [role, names] of Object.entries(PAGES) as [DemoRole, readonly string[]][]) {
        const wanted = names.filter((name) => name.includes(only));
        if (wanted.length === 0) continue;
        const page = await product.signedIn(role, look);
        leaveQuietly(page);
        for (const name of wanted) {
          await openPage(page, name);
          const words = `${role}-${name}`.replace(/[^a-z]+/g, '-').replace(/-$/, '');
          await page.screenshot({ path: join(folder, `${words}-${look.width}-${look.theme}.png`) });
        }
        await page.context().close();
      }
  } finally {
    await product.stop();
  }
  for (const complaint of product.complaints) console.log(`console: ${complaint}`);
}

async function main(): Promise<void> {
  const [folder, only = ''] = process.argv.slice(2);
  if (!folder) throw new Error('Say into which folder: npx tsx test/e2e/pictures.ts FOLDER');
  const support = async (name: string) =>
    (await import(`../support/${name}-database.mjs`)) as { default(): Promise<void> };
  const { default: holdDatabase } = await support('hold');
  const { default: releaseDatabase } = await support('release');
  await holdDatabase();
  try {
    await takePictures(folder, only);
  } finally {
    await releaseDatabase();
  }
}

main().catch((error: unknown) => {
  console.error(error instanceof Error ? error.message : error);
  process.exitCode = 1;
});
