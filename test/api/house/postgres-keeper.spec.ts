import { type ChildProcess, spawn } from 'node:child_process';
import { createInterface } from 'node:readline';
import { join } from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { Client } from 'pg';

/** A cluster of this file's own, beside the one the other tests use. */
const CLUSTER = 'pg-test-keeper';
const script = join(__dirname, '../../support/hold-and-say.mjs');

/** One process that holds the cluster. */
class Holder {
  readonly child: ChildProcess = spawn(process.execPath, [script, CLUSTER], {
    stdio: ['pipe', 'pipe', 'inherit'],
  });
  private readonly lines = createInterface({ input: this.child.stdout! })[Symbol.asyncIterator]();

  async line(): Promise<string> {
    const next = await this.lines.next();
    return next.done ? '' : next.value;
  }

  async leave(): Promise<void> {
    this.child.stdin!.write('leave\n');
    expect(await this.line()).toBe('left');
  }
}

async function ask<Row extends object>(url: string, question: string): Promise<Row[]> {
  const client = new Client({ connectionString: url });
  client.on('error', () => undefined);
  try {
    await client.connect();
    return (await client.query<Row>(question)).rows;
  } finally {
    await client.end().catch(() => undefined);
  }
}

/** Asks until it is answered: a server that was killed takes a moment to come back. */
async function askUntilAnswered<Row extends object>(url: string, question: string): Promise<Row[]> {
  for (const until = Date.now() + 15_000; ; await pause(100)) {
    try {
      return await ask<Row>(url, question);
    } catch (error) {
      if (Date.now() > until) throw error;
    }
  }
}

describe('the PostgreSQL keeper', () => {
  jest.setTimeout(60_000);

  it('gives one server to all who hold it at once, and stops it when the last has left', async () => {
    const [first, second] = [new Holder(), new Holder()];
    const [url, other] = await Promise.all([first.line(), second.line()]);
    expect(url).toMatch(/^postgres:\/\/tenthmark:.+@127\.0\.0\.1:\d+\/tenthmark$/);
    expect(other).toBe(url);
    await first.leave();
    expect(await ask(url, 'SELECT 1 AS one')).toEqual([{ one: 1 }]);
    await second.leave();
    await expect(ask(url, 'SELECT 1')).rejects.toThrow('ECONNREFUSED');
  });

  it('brings a killed server back at the same address, and outlives a holder that was killed', async () => {
    const [first, second] = [new Holder(), new Holder()];
    const [url] = await Promise.all([first.line(), second.line()]);
    first.child.kill('SIGKILL');
    const [file] = await ask<{ text: string }>(url, "SELECT pg_read_file('postmaster.pid') AS text");
    process.kill(Number(file?.text.split('\n')[0]), 'SIGKILL');
    expect(await askUntilAnswered(url, 'SELECT 2 AS two')).toEqual([{ two: 2 }]);
    await second.leave();
    await expect(ask(url, 'SELECT 1')).rejects.toThrow('ECONNREFUSED');
  });

  it('refuses a wrong password', async () => {
    const holder = new Holder();
    const url = new URL(await holder.line());
    url.password = 'guess';
    await expect(ask(url.href, 'SELECT 1')).rejects.toThrow('password authentication failed');
    await holder.leave();
  });
});
