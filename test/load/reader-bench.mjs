/** How fast logs are read and reduced, beside pandas on the same files, and how much memory a long log takes. */
import { spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { inClone } from '../../server/cli/house/places.mjs';

const LOGS = 20;
const ROWS = 3600;
const COLUMNS = 120;
/** Rounds of reading all logs, ours and pandas in turn, so that a busy moment of the machine strikes both. */
const ROUNDS = 5;
const AS_READ = { columnMap: null, fixedAmbient: null, window: null, nominalWatts: 180 };

/** Numbers that look like readings; the same every time (Numerical Recipes' linear congruence, from memory). */
function readings(seed) {
  let state = seed;
  return () => (state = (Math.imul(state, 1664525) + 1013904223) >>> 0) / 4294967296;
}

function wideLog(seed) {
  const next = readings(seed);
  const names = ['time_s', 'plate_c', 'ambient_c', 'watts', 'fan_rpm'];
  for (let i = names.length; i < COLUMNS; i += 1) names.push(`channel ${i} (V)`);
  const lines = [names.join(',')];
  for (let k = 0; k < ROWS; k += 1) {
    const rise = 40 - 30 * Math.exp(-k / 240);
    const cells = [
      String(k),
      (22 + rise + next() * 0.6).toFixed(2),
      (22 + next() * 0.1).toFixed(2),
      (180 + next()).toFixed(1),
      (1200 + next() * 9).toFixed(0),
    ];
    while (cells.length < COLUMNS) cells.push((next() * 1000).toFixed(2));
    lines.push(cells.join(','));
  }
  return lines.join('\n') + '\n';
}

/** Reads every file once with pandas and prints the seconds; importing it is not counted. */
const PANDAS = `
import sys, time
import pandas
began = time.perf_counter()
for name in sys.argv[1:]:
    pandas.read_csv(name)
print(time.perf_counter() - began)
`;

function pandasSeconds(files) {
  for (const python of [process.env.PYTHON, '/usr/bin/python3', 'python3']) {
    if (!python) continue;
    const run = spawnSync(python, ['-c', PANDAS, ...files], { encoding: 'utf8' });
    if (run.status === 0) return Number(run.stdout);
  }
  return null;
}

/** Most memory held while a long log streams through, as a multiple of its size. */
function memoryOf({ startReading }, megabytes) {
  const row = (i) => `${i},${(60 + (i % 7) / 10).toFixed(1)},${(22 + (i % 3) / 10).toFixed(1)},180.0,1200\n`;
  const before = process.memoryUsage();
  const reading = startReading('long.csv');
  reading.write(Buffer.from('time_s,plate_c,ambient_c,watts,fan_rpm\n'));
  let bytes = 0;
  let most = 0;
  for (let i = 0; bytes < megabytes * 1e6;) {
    let text = '';
    for (const end = i + 2000; i < end; i += 1) text += row(i);
    const chunk = Buffer.from(text);
    bytes += chunk.length;
    reading.write(chunk);
    const now = process.memoryUsage();
    most = Math.max(most, now.heapUsed + now.arrayBuffers - before.heapUsed - before.arrayBuffers);
  }
  reading.end();
  return most / bytes;
}

export default async function measure(context) {
  // The compiled code is what the server runs.
  const reduction = createRequire(import.meta.url)(inClone('dist/server/shared/reduction/index.js'));
  const folder = mkdtempSync(join(tmpdir(), 'tenthmark-logs-'));
  try {
    context.say(`Writing ${LOGS} logs of ${ROWS} rows × ${COLUMNS} columns`);
    const files = Array.from({ length: LOGS }, (_, i) => join(folder, `log-${i + 1}.csv`));
    files.forEach((file, i) => writeFileSync(file, wideLog(i + 1)));
    const read = (file) => {
      const reading = reduction.startReading(file);
      reading.write(readFileSync(file));
      return reading.end().log;
    };
    const ours = [];
    const peers = [];
    for (let round = 0; round < ROUNDS; round += 1) {
      const began = performance.now();
      files.forEach(read);
      ours.push((performance.now() - began) / 1000);
      const peer = pandasSeconds(files);
      if (peer !== null) peers.push(peer);
    }
    const middle = (values) => [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)];
    const logs = files.map(read);
    const reducing = await context.median(3, () =>
      Promise.resolve(logs.map((log) => reduction.reduceRun(log, AS_READ))),
    );
    const measurements = [
      {
        what: 'reading one log',
        value: (middle(ours) * 1000) / LOGS,
        unit: 'ms',
        note: `the first ${LOGS} took ${(ours[0] * 1000).toFixed(0)} ms`,
      },
      { what: 'reducing one log', value: reducing / LOGS, unit: 'ms' },
      { what: 'memory of a long log', value: memoryOf(reduction, 60), unit: '× its size', atMost: 4 },
    ];
    if (peers.length === 0)
      context.say('pandas is not installed, so there is no ratio: install python3-pandas, or set PYTHON.');
    else {
      measurements.push(
        {
          what: 'reading, ours ÷ pandas',
          value: middle(ours) / middle(peers),
          unit: '×',
          atMost: 0.5,
          note: `pandas ${((middle(peers) * 1000) / LOGS).toFixed(1)} ms a log`,
        },
        {
          what: 'reading and reducing, ours ÷ reading in pandas',
          value: (middle(ours) + reducing / 1000) / middle(peers),
          unit: '×',
        },
      );
    }
    return measurements;
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}
