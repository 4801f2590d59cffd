import { judge, welchPower } from '../../shared/judgement';
import { drift } from '../../shared/judgement/drift';
import { judgementInput, plainCooler, remountedCooler } from '../support/judgement-input';
import { reference, relativeError } from '../support/reference';

const close = (got: number | null | undefined, expected: number, relative: number): void => {
  expect(got).not.toBeNull();
  const error = relativeError(got as number, expected);
  expect(error <= relative ? 'close' : `${got} is not ${expected}: ${error}`).toBe('close');
};

const onlyPair = (...args: Parameters<typeof judgementInput>) => judge(judgementInput(...args)).pairs[0];

describe("Student's sleep data (R 4.2.2, t.test; data set shipped with R)", () => {
  interface Sleep {
    readonly data: { readonly group1: number[]; readonly group2: number[] };
    readonly results: Record<
      'welch90' | 'welch95' | 'welch99',
      { t: number; df: number; p: number; diff: number; se: number; ci: number[] }
    >;
  }
  const { data, results } = reference<Sleep>('sleep');
  const coolers = () => [plainCooler('group 1', data.group1), plainCooler('group 2', data.group2)];

  it.each([
    ['welch90', 0.9],
    ['welch95', 0.95],
    ['welch99', 0.99],
  ] as const)('%s', (name, confidence) => {
    const pair = onlyPair(coolers(), { thresholds: { confidence, power: 0.8, gapThatMatters: 1 } });
    const expected = results[name];
    close(pair.statistic, expected.t, 1e-10);
    close(pair.degreesOfFreedom, expected.df, 1e-10);
    close(pair.p, expected.p, 1e-9);
    close(pair.gap, expected.diff, 1e-10);
    close(pair.standardError, expected.se, 1e-10);
    close(pair.interval?.[0], expected.ci[0], 1e-10);
    close(pair.interval?.[1], expected.ci[1], 1e-10);
  });

  it('as printed in the R documentation: t = -1.8608, df = 17.776, p-value = 0.07939', () => {
    const pair = onlyPair(coolers());
    expect(pair.statistic?.toFixed(4)).toBe('-1.8608');
    expect(pair.degreesOfFreedom?.toFixed(3)).toBe('17.776');
    expect(pair.p?.toFixed(5)).toBe('0.07939');
  });
});

describe('two-sample example of the NIST/SEMATECH e-Handbook, section 1.3.5.3', () => {
  interface Handbook {
    readonly data: { readonly us: number[]; readonly japan: number[] };
    readonly computed: { readonly welch: { t: number; df: number; p: number } };
    readonly published: {
      readonly n: number[];
      readonly mean: number[];
      readonly sd: number[];
      readonly welch: { t: number; df: number };
    };
  }
  const { data, computed, published } = reference<Handbook>('nist_auto83b');
  const result = judge(judgementInput([plainCooler('US', data.us), plainCooler('Japan', data.japan)]));

  it('numbers, means and standard deviations as published', () => {
    expect(result.coolers.map(({ runs }) => runs)).toEqual(published.n);
    result.coolers.forEach(({ mean, standardDeviation }, index) => {
      expect(mean?.toFixed(5)).toBe(published.mean[index].toFixed(5));
      expect(standardDeviation?.toFixed(5)).toBe(published.sd[index].toFixed(5));
    });
  });
  it("Welch's statistic and degrees of freedom, published and to the last digits", () => {
    const [pair] = result.pairs;
    expect(pair.statistic?.toFixed(5)).toBe(published.welch.t.toFixed(5));
    close(pair.statistic, computed.welch.t, 1e-11);
    close(pair.degreesOfFreedom, computed.welch.df, 1e-11);
    close(pair.p, computed.welch.p, 1e-11);
  });
});

/** Worked examples computed by R 4.2.2 and SciPy 1.10; tolerance relative 1e-9, planning values 1e-8. Gaps there are B − A. */
interface Examples {
  readonly examples: {
    readonly id: string;
    readonly input: Record<string, unknown>;
    readonly expected: Record<string, number>;
  }[];
}
const example = (id: string) => {
  const found = reference<Examples>('methods-examples').examples.find((one) => one.id === id);
  if (!found) throw new Error(`no example ${id}`);
  return found;
};

describe('worked examples', () => {
  it('two coolers, ten runs each, no mounts', () => {
    const { input, expected } = example('O1');
    const pair = onlyPair([
      plainCooler('B', input['B'] as number[]),
      plainCooler('A', input['A'] as number[]),
    ]);
    close(pair.gap, expected['gap'], 1e-9);
    close(pair.standardError, expected['se'], 1e-9);
    close(pair.degreesOfFreedom, expected['df'], 1e-9);
    close(pair.statistic, expected['t'], 1e-9);
    close(pair.p, expected['p'], 1e-9);
    close(pair.interval?.[0], expected['ci95_lo'], 1e-9);
    close(pair.interval?.[1], expected['ci95_hi'], 1e-9);
    close(pair.equivalence?.interval[0], expected['ci90_lo'], 1e-9);
    close(pair.equivalence?.interval[1], expected['ci90_hi'], 1e-9);
    close(pair.equivalence?.p, expected['tost_p'], 1e-9);
    expect(pair.scope).toBe('runs only');
  });

  it('three mounts each, three or four runs a mount', () => {
    const { input, expected } = example('O2');
    const result = judge(
      judgementInput([
        remountedCooler('B', input['B'] as number[][]),
        remountedCooler('A', input['A'] as number[][]),
      ]),
    );
    const [pair] = result.pairs;
    close(pair.gap, expected['gap'], 1e-9);
    close(pair.standardError, expected['se'], 1e-9);
    close(pair.degreesOfFreedom, expected['df_used'], 1e-9);
    close(pair.p, expected['p'], 1e-9);
    close(pair.interval?.[0], expected['ci95_lo'], 1e-9);
    close(pair.interval?.[1], expected['ci95_hi'], 1e-9);
    close(pair.equivalence?.p, expected['tost_p'], 1e-9);
    close(pair.naive?.p, expected['naive_all_runs_p'], 1e-9);
    close(pair.naive?.gap, expected['naive_all_runs_gap'], 1e-9);
    close(pair.naive?.degreesOfFreedom, expected['naive_all_runs_df'], 1e-9);
    close((result.coolers[1].standardDeviation ?? 0) ** 2, expected['var_mount_means_A'], 1e-9);
    close((result.coolers[1].spreadBetweenRuns ?? 0) ** 2, expected['within_ms_A'], 1e-9);
    close((result.coolers[1].spreadBetweenMounts ?? 0) ** 2, expected['mount_var_component_raw_A'], 1e-9);
    close((result.coolers[0].spreadBetweenMounts ?? 0) ** 2, expected['mount_var_component_raw_B'], 1e-9);
    expect(pair.flag).toBe('within noise');
  });

  it('run-order drift, interleaved', () => {
    const { input, expected } = example('O4');
    const order = input['order'] as string[];
    const y = input['y'] as number[];
    const result = drift(
      y.map((value, index) => ({ value, order: index + 1, first: order[index] === 'B' })),
      0.95,
    );
    close(result?.adjustedGap, expected['ancova_gap'], 1e-9);
    close(result?.adjustedStandardError, expected['welch_ancova_se'], 1e-9);
    close(result?.adjustedDegreesOfFreedom, expected['welch_ancova_df'], 1e-9);
    close(result?.adjustedP, expected['welch_ancova_p'], 1e-9);
    close(result?.slope, expected['drift_per_run'], 1e-9);
    close(result?.slopeP, expected['drift_p'], 1e-9);
    close(result?.slopeInterval[0], expected['drift_ci95_lo'], 1e-9);
    close(result?.slopeInterval[1], expected['drift_ci95_hi'], 1e-9);
    close(result?.varianceInflation, expected['vif'], 1e-9);
  });

  it('planning: the smallest visible gap and power of Welch’s own test', () => {
    const { expected } = example('O6');
    const power = welchPower({ variance: 0.25, units: 10 }, { variance: 0.25, units: 10 }, 0.95);
    close(power?.gapAt(0.8), expected['welch_mdd_n10'], 1e-8);
    close(power?.powerAt(1), expected['welch_power_n10_gap1'], 1e-8);
    const variance = 0.4 ** 2 + 0.3 ** 2 / 4;
    const nested = welchPower({ variance, units: 3 }, { variance, units: 3 }, 0.95);
    close(nested?.gapAt(0.8), expected['welch_nested_mdd'], 1e-8);
  });
});

describe('power of Welch’s test (double trapezoid integral over both variances; absolute 1e-6)', () => {
  interface Power {
    readonly rows: {
      n1: number;
      n2: number;
      sd1: number;
      sd2: number;
      delta: number;
      alpha: number;
      power_exact: number;
    }[];
  }
  it.each(reference<Power>('power_welch').rows)('$n1 v $n2, SD $sd1 v $sd2, gap $delta', (row) => {
    const power = welchPower(
      { variance: row.sd1 ** 2, units: row.n1 },
      { variance: row.sd2 ** 2, units: row.n2 },
      1 - row.alpha,
    );
    expect(Math.abs((power?.powerAt(row.delta) ?? NaN) - row.power_exact)).toBeLessThan(1e-6);
  });
});
