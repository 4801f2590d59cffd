import { JudgementInput } from '../../../shared/contracts/judgement';
import { judge } from '../../../shared/judgement';
import { judgementInput, plainCooler, remountedCooler } from '../../support/judgement-input';

const BARE = [
  [41.9, 42.0, 42.1, 41.8],
  [42.2, 42.3, 42.1],
  [41.7, 41.9, 41.8],
];
const less = (mounts: number[][], by: number) =>
  mounts.map((mount) => mount.map((value) => Number((value - by).toFixed(2))));
const codes = (result: ReturnType<typeof judge>) => result.findings.map(({ code }) => code);
const runs = BARE.flat();

describe('one mount each, and the bench’s past', () => {
  const oneEach = (bench: JudgementInput['bench']) =>
    judge(
      judgementInput([remountedCooler('Coated', [less(BARE, 1.2).flat()]), remountedCooler('Bare', [runs])], {
        bench,
      }),
    );

  it('long enough: judged with it, and said to be taken from it', () => {
    const result = oneEach({ mountSpread: 0.3, mountSpreadDegreesOfFreedom: 12 });
    const [pair] = result.pairs;
    expect(result.method).toBe('welch-history/2');
    expect(pair).toMatchObject({ scope: 'bench history', flag: 'outside noise' });
    const alone = oneEach(null).pairs[0];
    expect(pair.marginOfError).toBeGreaterThan(2 * (alone.marginOfError ?? Infinity));
    expect(result.findings.find(({ code }) => code === 'bench-history')?.level).toBe('caution');
    expect(codes(result)).not.toContain('one-mount-each');
    expect(result.words[0].headline).toMatch(/^Outside noise/);
  });
  it('too wide: the same runs are within noise', () => {
    expect(oneEach({ mountSpread: 0.9, mountSpreadDegreesOfFreedom: 12 }).pairs[0].flag).toBe('within noise');
  });
  it('too short: run-to-run noise only, which cannot be signed off', () => {
    const result = oneEach({ mountSpread: 0.3, mountSpreadDegreesOfFreedom: 3 });
    expect(result.pairs[0].scope).toBe('runs only');
    expect(codes(result)).toEqual(expect.arrayContaining(['one-mount-each', 'history-too-short']));
  });
});

describe('one cooler remounted, the other not', () => {
  const mixed = (mounts: number) =>
    judge(
      judgementInput([
        remountedCooler('Coated', less(BARE, 3).slice(0, mounts)),
        remountedCooler('Bare', [runs]),
      ]),
    );
  it('three mounts stand for both, with their few degrees of freedom', () => {
    const result = mixed(3);
    expect(result.pairs[0]).toMatchObject({ basis: 'borrowed mounts', degreesOfFreedom: 2 });
    expect(result.findings.find(({ code }) => code === 'borrowed-mounts')?.text).toMatch(
      /Bare was fitted once/,
    );
  });
  it('two do not', () => {
    expect(mixed(2).pairs[0].notJudged?.code).toBe('mixed mounts');
  });
  it('gives the same in either order, sign apart', () => {
    const turned = judge(
      judgementInput([remountedCooler('Bare', [runs]), remountedCooler('Coated', less(BARE, 3))]),
    ).pairs[0];
    expect(turned.gap).toBe(-(mixed(3).pairs[0].gap ?? NaN));
    expect(turned.marginOfError).toBe(mixed(3).pairs[0].marginOfError);
  });
});

describe('second opinions', () => {
  it('one far run is named, stays in, and the trimmed test tells that it drives the call', () => {
    const a = [40.1, 40.3, 40.2, 40.0, 40.2, 40.1, 40.3, 40.2];
    const b = [40.7, 40.9, 40.8, 40.6, 40.8, 40.7, 40.9, 46.0];
    const result = judge(judgementInput([plainCooler('A', a), plainCooler('B', b)]));
    const [pair] = result.pairs;
    expect(pair.flag).toBe('within noise');
    expect(pair.outliers).toEqual(['B, run 8']);
    expect(pair.trimmed?.agrees).toBe(false);
    expect(result.coolers[1].runs).toBe(8);
    expect(codes(result)).toContain('stands-out');
  });
  it('permutation agrees where the gap is plain', () => {
    const [pair] = judge(
      judgementInput([plainCooler('A', runs), plainCooler('B', less(BARE, 1).flat())]),
    ).pairs;
    expect(pair.permutation).toMatchObject({ exact: true, arrangements: 184756, agrees: true });
  });
});

describe('how much evidence is needed', () => {
  it('is the least that finds the gap that matters: one unit fewer does not', () => {
    const cooler = (name: string, at: number) =>
      remountedCooler(name, [[at], [at + 0.6], [at + 0.3], [at - 0.2]]);
    const input = judgementInput([cooler('A', 40), cooler('B', 40.2)], {
      thresholds: { confidence: 0.95, power: 0.8, gapThatMatters: 0.5 },
    });
    const [pair] = judge(input).pairs;
    const needed = pair.unitsNeeded?.units ?? NaN;
    expect(needed).toBeGreaterThan(4);
    // The normal's number is a bound from below for the same spread.
    const variance = 0.35 ** 2;
    expect(needed).toBeGreaterThanOrEqual(Math.floor(((1.96 + 0.8416) / 0.5) ** 2 * 2 * variance));
    expect(codes(judge(input))).toContain('evidence-needed');
  });
});

describe('three coolers or more', () => {
  const cooler = (name: string, at: number) =>
    plainCooler(
      name,
      [0, 0.3, -0.2, 0.1, 0.15, -0.1].map((off) => Number((at + off).toFixed(2))),
    );
  const result = judge(judgementInput([cooler('A', 40), cooler('B', 40.15), cooler('C', 41)]));

  it('a pair that would count alone is held against a stricter level', () => {
    const alone = judge(judgementInput([cooler('A', 40), cooler('B', 40.15)])).pairs[0];
    const [among] = result.pairs;
    expect(among.adjustedP).toBeGreaterThanOrEqual(alone.p ?? NaN);
    for (const pair of result.pairs)
      expect(pair.flag === 'outside noise').toBe(Math.abs(pair.gap ?? 0) > (pair.marginOfError ?? Infinity));
    for (const pair of result.pairs)
      expect(pair.flag === 'outside noise').toBe((pair.adjustedP ?? NaN) < 0.05);
  });
  it('are ranked, with a bar over those that cannot be told apart', () => {
    expect(result.several?.ranking).toEqual(['A', 'B', 'C']);
    expect(result.several?.bars).toEqual([['A', 'B']]);
    expect(result.several?.omnibus?.p).toBeLessThan(0.001);
  });
});

describe('uncertainty budget', () => {
  const budgeted = (uncertainties: JudgementInput['uncertainties']) =>
    judge(
      judgementInput([remountedCooler('Coated', less(BARE, 1.2)), remountedCooler('Bare', BARE)], {
        uncertainties,
      }),
    ).pairs[0];
  const plain = budgeted([]);
  const sensor = {
    source: 'Sensor offset',
    value: 0.5,
    distribution: 'rectangular',
    degreesOfFreedom: null,
  } as const;

  it('what both coolers share cancels, and is listed', () => {
    const pair = budgeted([{ ...sensor, kind: 'additive', varies: 'never' }]);
    expect(pair.marginOfError).toBe(plain.marginOfError);
    expect(pair.budget?.lines.at(-1)).toMatchObject({ source: 'Sensor offset', uncertainty: 0 });
  });
  it('what differs between coolers widens the verdict itself', () => {
    const pair = budgeted([{ ...sensor, kind: 'additive', varies: 'per cooler' }]);
    const u = (0.5 / Math.sqrt(3)) * Math.SQRT2;
    expect(pair.standardError).toBeCloseTo(Math.hypot(plain.standardError ?? NaN, u), 12);
    expect(pair.budget?.standardUncertainty).toBeCloseTo(pair.standardError ?? NaN, 12);
  });
  it('a gain shared by both scales the gap', () => {
    const pair = budgeted([
      {
        source: 'Sensor gain',
        kind: 'gain',
        value: 0.01,
        distribution: 'normal',
        degreesOfFreedom: null,
        varies: 'never',
      },
    ]);
    expect(pair.budget?.lines.at(-1)?.uncertainty).toBeCloseTo(0.012, 3);
  });
});

it('the first edition still judges as it did', () => {
  const input = judgementInput([remountedCooler('Coated', less(BARE, 1.2)), remountedCooler('Bare', BARE)]);
  const first = judge(input, 'welch-mounts/1');
  expect(first.method).toBe('welch-mounts/1');
  expect(first.pairs[0].basis).toBeUndefined();
  expect(first.pairs[0].marginOfError).toBe(judge(input).pairs[0].marginOfError);
});
