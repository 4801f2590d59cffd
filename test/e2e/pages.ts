import type { Page } from 'playwright-core';
import { sampleLogs } from '../../server/cli/demo';
import { DemoRole, Look } from './served-product';

/** Both widths the pages are made for, in both themes. */
export const LOOKS: readonly Look[] = [
  { width: 1440, height: 900, theme: 'light' },
  { width: 1440, height: 900, theme: 'dark' },
  { width: 390, height: 844, theme: 'light' },
  { width: 390, height: 844, theme: 'dark' },
];

/** Addresses each role is looked at on; those without a stroke stand for the demo's own study, verdict and so on. */
export const PAGES: Readonly<Record<DemoRole, readonly string[]>> = {
  analyst: [
    '/',
    '/studies',
    '/studies/new',
    'study',
    'verdict',
    '/intake',
    'intake',
    'intake with logs',
    '/account',
  ],
  lead: ['/', 'verdict', '/thresholds', '/bench', 'bench'],
  auditor: ['/', 'verdict', '/audit', '/audit/ledger'],
  administrator: ['/', '/people', '/outbox', '/bench', '/no-access?for=analyst', '/nothing-here'],
};

/** Opens one of `PAGES` and waits until it shows what it has fetched. */
export async function openPage(page: Page, name: string): Promise<void> {
  await page.goto(await addressOf(page, name));
  await page.getByRole('heading', { level: 1 }).waitFor();
  await page.waitForLoadState('networkidle');
  if (name === 'intake with logs') await dropSampleLogs(page);
}

/** Leaves what was dropped without being asked, so that the next address can be opened. */
export const leaveQuietly = (page: Page): void => {
  page.on('dialog', (dialog) => void dialog.accept());
};

/** The twenty sample logs, a copy of one and a file that is no log; two selected, so that the line for many shows. */
async function dropSampleLogs(page: Page): Promise<void> {
  const logs = sampleLogs().map(({ fileName, bytes }) => asFile(fileName, Buffer.from(bytes)));
  await page
    .getByLabel('Choose run logs')
    .setInputFiles([
      ...logs,
      asFile('copy-of-first.csv', logs[0].buffer),
      asFile('shopping-list.txt', Buffer.from('bread\nmilk\n')),
    ]);
  await page.getByText('22 logs: 22 read.').waitFor();
  await page.getByLabel(`Select ${logs[1].name}`).check();
  await page.getByLabel(`Select ${logs[2].name}`).check();
}

export const asFile = (name: string, buffer: Buffer) => ({ name, mimeType: 'text/csv', buffer });

async function addressOf(page: Page, name: string): Promise<string> {
  if (name.startsWith('/')) return name;
  const fetched = async (path: string) => {
    const answer = await page.request.get(path);
    return (await answer.json()) as { items?: { id: string }[]; benches?: { id: string }[] };
  };
  switch (name) {
    case 'study':
      return `/studies/${(await fetched('/api/studies')).items?.at(-1)?.id}`;
    case 'intake':
    case 'intake with logs':
      return `/intake/${(await fetched('/api/studies')).items?.at(-1)?.id}`;
    case 'verdict':
      return `/verdicts/${(await fetched('/api/verdicts')).items?.[0]?.id}`;
    default:
      return `/bench/${(await fetched('/api/benches')).benches?.[0]?.id}`;
  }
}
