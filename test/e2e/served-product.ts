import { ChildProcess, fork } from 'node:child_process';
import { existsSync } from 'node:fs';
import { resolve } from 'node:path';
import { Browser, BrowserContext, chromium, Page } from 'playwright-core';
import { createTestDatabase, TestDatabase } from '../support/test-database';

const MAIN = resolve(__dirname, '../../dist/server/server/main.js');
const CHROMIUM = process.env['CHROMIUM_PATH'] ?? '/usr/bin/chromium';
/** As root Chromium needs no sandbox; the other switches keep it from looking for the network. */
const SWITCHES = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

export type DemoRole = 'analyst' | 'lead' | 'auditor' | 'administrator';

export interface Look {
  readonly width: number;
  readonly height: number;
  readonly theme: 'light' | 'dark';
}
export const DESK: Look = { width: 1440, height: 900, theme: 'light' };

/** The built product on a database of its own, with the demo loaded, and a browser to use it with. */
export interface ServedProduct {
  readonly address: string;
  readonly browser: Browser;
  /** A page on which someone of this role has signed in; what goes wrong on it is added to `complaints`. */
  signedIn(role: DemoRole, look?: Look): Promise<Page>;
  /** A page on which nobody has. */
  visitor(look?: Look): Promise<Page>;
  /** Console errors and uncaught errors of all pages. */
  readonly complaints: string[];
  stop(): Promise<void>;
}

export async function serveProduct(): Promise<ServedProduct> {
  if (!existsSync(MAIN)) throw new Error('The server is not built: run "npm run build" first.');
  const database = await createTestDatabase();
  const server = fork(MAIN, {
    env: {
      ...process.env,
      DATABASE_URL: database.url,
      PORT: '0',
      HOST: '127.0.0.1',
      TENTHMARK_SECRET: 'only-for-this-test-run-0123456789abcdef',
      TENTHMARK_DEMO: 'on',
    },
    stdio: 'ignore',
  });
  try {
    const address = await addressOf(server);
    const browser = await chromium.launch({ executablePath: CHROMIUM, headless: true, args: SWITCHES });
    return product(address, browser, server, database);
  } catch (error) {
    server.kill();
    await database.drop();
    throw error;
  }
}

function addressOf(server: ChildProcess): Promise<string> {
  return new Promise((found, failed) => {
    server.on('message', (message: { type?: string; address?: string }) => {
      if (message.type === 'ready' && message.address) found(message.address);
    });
    server.on('exit', (code) => failed(new Error(`the server ended with code ${code} before it was ready`)));
  });
}

function product(
  address: string,
  browser: Browser,
  server: ChildProcess,
  database: TestDatabase,
): ServedProduct {
  const complaints: string[] = [];
  const open = async ({ width, height, theme }: Look): Promise<Page> => {
    const context: BrowserContext = await browser.newContext({
      baseURL: address,
      viewport: { width, height },
      colorScheme: theme,
    });
    const page = await context.newPage();
    page.on('console', (message) => {
      if (message.type() === 'error') complaints.push(`${page.url()}: ${message.text()}`);
    });
    page.on('pageerror', (error) => complaints.push(`${page.url()}: ${error.message}`));
    return page;
  };
  return {
    address,
    browser,
    complaints,
    visitor: async (look = DESK) => {
      const page = await open(look);
      await page.goto('/');
      return page;
    },
    signedIn: async (role, look = DESK) => {
      const page = await open(look);
      await page.goto('/sign-in');
      await page.getByRole('button', { name: `Sign in as ${role}` }).click();
      await page.getByRole('link', { name: 'Tenthmark, to Waiting' }).waitFor();
      return page;
    },
    stop: async () => {
      await browser.close();
      const gone = new Promise((done) => server.once('exit', done));
      server.kill();
      await gone;
      await database.drop();
    },
  };
}
