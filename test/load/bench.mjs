/**
 * `npm run bench`: measures the product against its budgets and says so in numbers.
 *
 *   npm run bench              every measurement
 *   npm run bench -- start     only test/load/start-bench.mjs
 *
 * A measurement is a file `test/load/NAME-bench.mjs` or `NAME-bench.ts` whose default export is
 * `async (context) => Measurement[]`, where
 *   context.say(text)          says what is going on
 *   context.median(times, fn)  median duration of an async `fn`, in milliseconds, after one unmeasured call
 *   context.database()         address of an empty throw-away PostgreSQL database's cluster, with full rights
 *   Measurement                { what, value, unit, atMost?, atLeast?, note? }
 * A budget (`atMost`, `atLeast`) that is missed makes the command fail. Numbers hold for the machine they are taken on;
 * where a peer exists, the measurement runs it too and gives the ratio, which travels better.
 */
import { readdirSync } from 'node:fs';
import { cpus, totalmem } from 'node:os';
import { pathToFileURL } from 'node:url';
import { ensureBuilds } from '../../server/cli/house/builds.mjs';
import { whenToStop } from '../../server/cli/house/lifetime.mjs';
import { ensurePackages } from '../../server/cli/house/packages.mjs';
import { inClone } from '../../server/cli/house/places.mjs';
import { ensurePostgres, holdPostgres } from '../../server/cli/house/postgres.mjs';
import { stopChildren } from '../../server/cli/house/processes.mjs';
import { createProgress } from '../../server/cli/house/progress.mjs';
import { Trouble, inWords } from '../../server/cli/house/trouble.mjs';

const progress = createProgress();
let held = null;

async function end(code) {
  await stopChildren();
  await held?.release();
  process.exit(code);
}

const context = {
  say: (text) => progress.say(`  ${text}`),
  async median(times, work) {
    await work();
    const taken = [];
    for (let i = 0; i < times; i += 1) {
      const from = performance.now();
      await work();
      taken.push(performance.now() - from);
    }
    return taken.sort((a, b) => a - b)[Math.floor(times / 2)];
  },
  async database() {
    await ensurePostgres(progress);
    held ??= await holdPostgres('pg-test-bench');
    return held.url;
  },
};

const shown = (value) => (Math.abs(value) >= 100 ? value.toFixed(0) : value.toPrecision(3));

/** One line for a measurement; true when it keeps its budget. */
function report({ what, value, unit, atMost, atLeast, note }) {
  const kept = !(value > atMost) && !(value < atLeast) && Number.isFinite(value);
  const budget = [
    atMost !== undefined && `at most ${atMost}`,
    atLeast !== undefined && `at least ${atLeast}`,
  ];
  const words = budget.filter(Boolean).join(', ');
  const verdict = words ? `  ${kept ? 'kept' : 'MISSED'}: ${words} ${unit}` : '';
  progress.say(`  ${what}: ${shown(value)} ${unit}${verdict}${note ? `  (${note})` : ''}`);
  return kept;
}

function chosen(names) {
  const files = readdirSync(inClone('test/load')).filter((file) => /-bench\.(mjs|ts)$/.test(file));
  const all = new Map(files.map((file) => [file.replace(/-bench\.(mjs|ts)$/, ''), file]));
  const unknown = names.find((name) => !all.has(name));
  if (unknown)
    throw new Trouble(`There is no measurement "${unknown}".`, `There are: ${[...all.keys()].join(', ')}.`);
  return [...all].filter(([name]) => names.length === 0 || names.includes(name));
}

whenToStop(end);
try {
  const benches = chosen(process.argv.slice(2));
  await ensurePackages(progress);
  await ensureBuilds(progress);
  const { register } = await import('tsx/esm/api');
  register();
  progress.say(
    `${cpus().length} × ${cpus()[0].model}, ${Math.round(totalmem() / 2 ** 30)} GB, Node.js ${process.versions.node}`,
  );
  let missed = 0;
  for (const [name, file] of benches) {
    progress.say(`\n${name}`);
    const { default: measure } = await import(pathToFileURL(inClone('test/load', file)).href);
    for (const measurement of await measure(context)) missed += report(measurement) ? 0 : 1;
  }
  progress.say(missed ? `\n${missed} budgets missed.` : '\nEvery budget kept.');
  await end(missed ? 1 : 0);
} catch (error) {
  progress.say(inWords(error));
  await end(1);
}
