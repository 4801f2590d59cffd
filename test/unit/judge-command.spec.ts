import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';

const ROOT = resolve(__dirname, '../..');
const COMMAND = resolve(ROOT, 'server/cli/judge.mjs');

interface Pair {
  readonly [key: string]: unknown;
  readonly a: string;
  readonly b: string;
  readonly gap: number;
}
interface Answer {
  readonly method: string;
  readonly engine: string;
  readonly unit: string;
  readonly coolers: readonly Record<string, unknown>[];
  readonly pairs: readonly Pair[];
  readonly findings: readonly { readonly code: string; readonly level: string; readonly text: string }[];
}

let folder = '';
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'tenthmark-judge-'));
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

/** Runs the command as a process of its own, on a request file or on standard input. */
function run(request: unknown, { throughInput = false } = {}) {
  const text = typeof request === 'string' ? request : JSON.stringify(request);
  if (!throughInput) writeFileSync(join(folder, 'request.json'), text);
  const { status, stdout, stderr } = spawnSync(
    process.execPath,
    [COMMAND, throughInput ? '-' : join(folder, 'request.json')],
    { cwd: folder, encoding: 'utf8', input: throughInput ? text : '' },
  );
  return { status, stdout, stderr };
}
const answered = (request: unknown, options = {}): Answer => {
  const { status, stdout, stderr } = run(request, options);
  expect({ status, stderr: status === 0 ? '' : stderr }).toEqual({ status: 0, stderr: '' });
  return JSON.parse(stdout) as Answer;
};
const refused = (request: unknown): string => {
  const { status, stdout, stderr } = run(request);
  expect({ status, stdout }).toEqual({ status: 2, stdout: '' });
  expect(stderr.trim().split('\n')).toHaveLength(1);
  return stderr.trim();
};

const values = (...numbers: number[]) => numbers.map((value) => ({ value }));
/** Student's sleep data (data set shipped with R; results printed in the documentation of t.test). */
const SLEEP = {
  coolers: [
    { name: 'group 1', runs: values(0.7, -1.6, -0.2, -1.2, -0.1, 3.4, 3.7, 0.8, 0, 2) },
    { name: 'group 2', runs: values(1.9, 0.8, 1.1, 0.1, -0.1, 4.4, 5.5, 1.6, 4.6, 3.4) },
  ],
};

describe('a request that can be judged', () => {
  it('is answered in full, with the numbers of R', () => {
    const answer = answered(SLEEP);
    const [pair] = answer.pairs;
    expect(answer.unit).toBe('°C');
    expect(answer.coolers).toMatchObject([
      { name: 'group 1', runs: 10, mounts: null },
      { name: 'group 2', runs: 10, mounts: null },
    ]);
    expect(pair.gap).toBeCloseTo(-1.58, 12);
    expect(pair['degreesOfFreedom']).toBeCloseTo(17.7764735161785, 9);
    expect(pair['p']).toBeCloseTo(0.0793941401873582, 11);
    expect(pair['flag']).toBe('within noise');
    const asked =
      'a b gap standardError degreesOfFreedom confidence interval marginOfError p clearance smallestVisibleGap flag sizeCall power headline quote scope';
    for (const field of asked.split(' ')) expect(pair).toHaveProperty(field);
  });

  it('gives the same answer through standard input', () => {
    expect(answered(SLEEP, { throughInput: true })).toEqual(answered(SLEEP));
  });

  it('judges every pair, in the order of the request', () => {
    const cooler = (name: string, at: number) => ({
      name,
      mounts: [0, 0.2, 0.1].map((off) => ({ runs: values(at + off, at + off + 0.05) })),
    });
    const answer = answered({ coolers: [cooler('A', 40), cooler('B', 41), cooler('C', 42)] });
    expect(answer.pairs.map(({ a, b }) => a + b)).toEqual(['AB', 'AC', 'BC']);
    expect(answer.pairs[1].gap).toBeCloseTo(-2, 12);
    expect(answer.pairs[1]['flag']).toBe('outside noise');
  });

  it('gives null for what cannot be known', () => {
    const answer = answered({
      coolers: [
        { name: 'A', runs: values(41.2) },
        { name: 'B', runs: values(42) },
      ],
    });
    expect(answer.pairs[0]).toMatchObject({ flag: 'not judged', p: null, interval: null, clearance: null });
    expect(answer.coolers[0]).toMatchObject({ mean: 41.2, standardDeviation: null });
  });

  it('reads a gap that matters in K/W when no watts are known, and says so', () => {
    const answer = answered({
      metric: 'resistance',
      thresholds: { gapThatMatters: 0.01 },
      coolers: [
        { name: 'A', runs: values(0.21, 0.213, 0.208) },
        { name: 'B', runs: values(0.22, 0.223, 0.218) },
      ],
    });
    expect(answer.unit).toBe('K/W');
    expect(answer.pairs[0]['gapThatMatters']).toBe(0.01);
    expect(answer.findings.map(({ code }) => code)).toContain('gap-that-matters-unit');
  });

  it('reads logs that lie beside the request', () => {
    const log = (plate: number) =>
      [
        'Time [s],Plate [°C],Ambient [°C]',
        ...Array.from({ length: 1201 }, (_, second) =>
          [
            second,
            (plate + 0.1 * Math.sin(second * 1.7)).toFixed(3),
            (22 + 0.05 * Math.cos(second)).toFixed(3),
          ].join(','),
        ),
      ].join('\n');
    for (const [name, plate] of [
      ['a1', 61],
      ['a2', 61.2],
      ['a3', 61.1],
      ['b1', 62],
      ['b2', 62.2],
      ['b3', 62.1],
    ] as const)
      writeFileSync(join(folder, `${name}.csv`), log(plate));
    const runs = (cooler: string) => [1, 2, 3].map((number) => ({ file: `${cooler}${number}.csv` }));
    const answer = answered({
      coolers: [
        { name: 'A', runs: runs('a') },
        { name: 'B', runs: runs('b') },
      ],
    });
    expect(answer.pairs[0].gap).toBeCloseTo(-1, 3);
    expect(answer.coolers[0]['mean']).toBeCloseTo(39.1, 2);
  });

  it('tells of a reading it had to skip, by file, row and column', () => {
    const rows = Array.from({ length: 1201 }, (_, second) => `${second},${second === 700 ? '6O.1' : 60},22`);
    writeFileSync(join(folder, 'skip.csv'), ['Time [s],Plate [°C],Ambient [°C]', ...rows].join('\n'));
    const { findings } = answered({
      coolers: [{ name: 'A', runs: [{ file: 'skip.csv' }, ...values(37, 38.5)] }, SLEEP.coolers[1]],
    });
    const told = findings.find(({ code }) => code === 'bad-cells');
    expect(told?.text).toMatch(/^skip\.csv: 1 cell of .*6O\.1.* row 702/);
  });

  it('of five thousand runs takes seconds, not minutes', () => {
    const many = (at: number) =>
      values(...Array.from({ length: 2500 }, (_, index) => at + ((index * 7919) % 100) / 100));
    const from = Date.now();
    answered({
      coolers: [
        { name: 'A', runs: many(40) },
        { name: 'B', runs: many(40.5) },
      ],
    });
    expect(Date.now() - from).toBeLessThan(20_000);
  }, 30_000);
});

describe('a request that cannot be used: exit code 2 and one line that says where', () => {
  it.each<[string, unknown, RegExp]>([
    ['broken JSON', '{"coolers": [\n  {"name": "A",, }]}', /request\.json: row 2, column \d+: not JSON/],
    ['an unknown field', { ...SLEEP, treshold: 1 }, /treshold/],
    [
      'a missing value',
      { coolers: [{ name: 'A', runs: [{}] }, SLEEP.coolers[1]] },
      /coolers\[0\]\.runs\[0\].*"value" or "file"/,
    ],
    [
      'a value that is no number',
      { coolers: [{ name: 'A', runs: [{ value: null }] }, SLEEP.coolers[1]] },
      /coolers\[0\]\.runs\[0\]\.value/,
    ],
    ['one cooler alone', { coolers: [SLEEP.coolers[0]] }, /coolers/],
    ['two coolers of one name', { coolers: [SLEEP.coolers[0], SLEEP.coolers[0]] }, /"group 1"/],
    [
      'a log that is not there',
      { coolers: [{ name: 'A', runs: [{ file: 'none.csv' }] }, SLEEP.coolers[1]] },
      /none\.csv: no such file/,
    ],
  ])('%s', (_name, request, message) => {
    expect(refused(request)).toMatch(message);
  });

  it('a log without readings, by file', () => {
    writeFileSync(join(folder, 'bad.csv'), 'Time [s],Plate [°C],Ambient [°C]\n0,off,off\n1,off,off\n');
    expect(refused({ coolers: [{ name: 'A', runs: [{ file: 'bad.csv' }] }, SLEEP.coolers[1]] })).toMatch(
      /^bad\.csv/,
    );
  });
});
