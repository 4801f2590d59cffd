import { sampleLogs } from '../../server/cli/demo';
import { ServedProduct, serveProduct } from './served-product';

jest.setTimeout(180_000);

let product: ServedProduct;
beforeAll(async () => {
  product = await serveProduct();
});
afterAll(() => product.stop());

/**
 * The job of the product from end to end: an analyst drops twenty logs, judges and submits; a lead signs off; an auditor
 * re-runs the verdict from the stored bytes and sees the same numbers.
 */
it('takes twenty logs to a signed-off verdict that re-runs identical', async () => {
  const analyst = await product.signedIn('analyst');
  await analyst.goto('/studies/new');
  await analyst.getByLabel('Name of the study').fill('Fins, told again');
  await analyst.getByLabel('Compared cooler').fill('Tall fins');
  await analyst.getByLabel('Reference cooler').fill('Short fins');
  await analyst.getByLabel('Nominal power, W').fill('120');
  await analyst.getByRole('button', { name: 'Make the study' }).click();
  await analyst.getByRole('heading', { name: 'Fins, told again' }).waitFor();

  await analyst.getByRole('link', { name: 'Bring in runs' }).click();
  const files = sampleLogs().map(({ fileName, bytes }) => ({
    name: fileName,
    mimeType: 'text/csv',
    buffer: Buffer.from(bytes),
  }));
  expect(files).toHaveLength(20);
  await analyst.getByLabel('Choose run logs').setInputFiles(files);
  await analyst.getByText('20 logs: 20 read.').waitFor();
  // Cooler, mount and run come from the file names.
  expect(
    await analyst
      .getByLabel('Cooler of tall-fins_m2_r3.csv')
      .evaluate((field: HTMLSelectElement) => field.selectedOptions[0].text),
  ).toBe('Tall fins');
  expect(await analyst.getByLabel('Mount of tall-fins_m2_r3.csv').inputValue()).toBe('2');
  await analyst.getByRole('button', { name: 'Store 20 runs' }).click();
  await analyst.getByText('20 runs stored, with the same numbers as shown.').waitFor();
  await analyst.getByRole('button', { name: 'Judge these runs' }).click();
  await analyst.waitForURL(/\/verdicts\//);
  const headline = analyst.getByRole('heading', { level: 1 });
  await headline.waitFor();
  expect(await headline.innerText()).toMatch(/^(Outside|Within) noise/);
  const words = await headline.innerText();
  const address = new URL(analyst.url()).pathname;
  await analyst.getByRole('button', { name: 'Submit for sign-off' }).click();
  await confirmIfAsked(analyst);
  await analyst.getByText('Waiting for a lead’s sign-off', { exact: false }).first().waitFor();

  const lead = await product.signedIn('lead');
  await lead.getByText('Fins, told again').first().waitFor();
  await lead.goto(address);
  await lead.getByRole('button', { name: 'Sign off this verdict' }).click();
  await confirmIfAsked(lead);
  await lead
    .getByText(/^Signed off/)
    .first()
    .waitFor();

  const auditor = await product.signedIn('auditor');
  await auditor.goto(address);
  expect(await auditor.getByRole('heading', { level: 1 }).innerText()).toBe(words);
  await auditor
    .getByRole('button', { name: /^Re-run/ })
    .first()
    .click();
  await auditor.getByText('every field, to the last digit', { exact: false }).first().waitFor();

  expect(product.complaints).toEqual([]);
});

/** Acts that cannot be taken back ask once more, in a dialog whose last button does it. */
async function confirmIfAsked(page: Awaited<ReturnType<ServedProduct['signedIn']>>): Promise<void> {
  const dialog = page.getByRole('dialog');
  await dialog.waitFor({ timeout: 5000 }).catch(() => undefined);
  if (await dialog.isVisible()) await dialog.locator('button.fill').click();
}
