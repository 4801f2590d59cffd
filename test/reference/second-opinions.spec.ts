import { judge } from '../../shared/judgement';
import { holm } from '../../shared/judgement/holm';
import { grubbsCritical, grubbsStatistic, outliers } from '../../shared/judgement/outliers';
import { permutationTest } from '../../shared/judgement/permutation';
import { welchAnova } from '../../shared/judgement/several';
import { trimmedTest } from '../../shared/judgement/trimmed';
import { combine, standardUncertainty } from '../../shared/judgement/uncertainty-budget';
import { quickWelchPower, welchPower } from '../../shared/judgement/welch-power';
import { mean, sampleVariance } from '../../shared/numerics';
import { judgementInput, plainCooler, remountedCooler } from '../support/judgement-input';
import { reference, relativeError, worstOf } from '../support/reference';

const close = (got: number | null | undefined, expected: number, relative: number): void =>
  expect({ got, off: relativeError(got ?? NaN, expected) <= relative ? 'close' : expected }).toEqual({
    got,
    off: 'close',
  });
const side = (values: readonly number[]) => ({
  mean: mean(values),
  variance: sampleVariance(values),
  units: values.length,
});

const YUEN_SLEEP = { statistic: -1.6167773658133768, p: 0.1433782885244404 };
const YUEN_O1 = { statistic: -5.708616078003665, p: 0.0005336356652228687 };

interface TwoGroups {
  readonly data: Record<string, number[]>;
  readonly results: Record<string, Record<string, number>>;
}

/** Worked examples computed by R 4.2.2 and SciPy 1.10 to twelve digits; relative 1e-9. Gaps there are B − A. */
interface Example {
  readonly id: string;
  readonly input: Record<string, never>;
  readonly expected: Record<string, number>;
}
const example = (id: string): Example => {
  const found = reference<{ examples: Example[] }>('methods-examples').examples.find((one) => one.id === id);
  if (!found) throw new Error(`no example ${id}`);
  return found;
};

describe('exact permutation (counts by complete enumeration in R 4.2.2)', () => {
  it("Student's sleep data: 15 048 of 184 756", () => {
    const { data } = reference<TwoGroups>('sleep');
    const result = permutationTest(data['group1'], data['group2'], 1);
    expect(result).toEqual({ p: 15048 / 184756, arrangements: 184756, exact: true });
  });
  it('ten against ten temperatures: 142 106 of 184 756', () => {
    const { data } = reference<TwoGroups>('synthetic_10v10');
    expect(permutationTest(data['x'], data['y'], 1)?.p).toBe(142106 / 184756);
  });
  it('does not depend on the order of the readings', () => {
    const { data } = reference<TwoGroups>('sleep');
    const turned = permutationTest([...data['group1']].reverse(), [...data['group2']].reverse(), 1);
    expect(turned?.p).toBe(15048 / 184756);
  });
  it('beyond three million arrangements draws, near the exact answer and the same each time', () => {
    const values = Array.from({ length: 15 }, (_, index) => 40 + ((index * 37) % 15) / 10);
    const others = values.map((value, index) => value + 0.4 + (index % 4) / 20);
    const drawn = permutationTest(values, others, 7);
    expect(drawn?.exact).toBe(false);
    expect(permutationTest(values, others, 7)).toEqual(drawn);
    const [pair] = judge(judgementInput([plainCooler('A', values), plainCooler('B', others)])).pairs;
    expect(Math.abs((drawn?.p ?? NaN) - (pair.p ?? NaN))).toBeLessThan(0.01);
  });
});

it("Yuen's test (scipy.stats.ttest_ind with trim=0.2, equal_var=False; SciPy 1.10.1)", () => {
  const { data } = reference<TwoGroups>('sleep');
  const result = trimmedTest(data['group1'], data['group2']);
  close(result && result.gap / result.standardError, YUEN_SLEEP.statistic, 1e-12);
  close(result?.p, YUEN_SLEEP.p, 1e-12);
  const o1 = example('O1').input as unknown as Record<string, number[]>;
  const other = trimmedTest(o1['A'], o1['B']);
  close(other && other.gap / other.standardError, YUEN_O1.statistic, 1e-11);
  close(other?.p, YUEN_O1.p, 1e-11);
});

describe('several coolers', () => {
  const { input, expected } = example('O5');
  const groups = (input as unknown as { groups: Record<string, number[]> }).groups;
  const names = Object.keys(groups);

  it("Holm's adjusted p of every pair", () => {
    const { pairs } = judge(judgementInput(names.map((name) => plainCooler(name, groups[name]))));
    for (const { a, b, adjustedP, p } of pairs) {
      close(p, expected[`${a}_${b}.p_raw`], 1e-9);
      close(adjustedP, expected[`${a}_${b}.p_holm`], 1e-9);
    }
  });
  it("Welch's analysis of variance", () => {
    const result = welchAnova(names.map((name) => side(groups[name])));
    close(result?.statistic, expected['omnibus_welch_F'], 1e-9);
    close(result?.p, expected['omnibus_welch_p'], 1e-9);
  });
  it.each([
    ['plantgrowth', 'group', 'weight'],
    ['airquality_ozone_by_month', 'Month', 'Ozone'],
  ])('Welch one-way on %s (oneway.test, R 4.2.2)', (name, group, value) => {
    const { data, results } = reference<{
      data: Record<string, (string | number)[]>;
      results: { welch_oneway: { F: number; df2: number; p: number } };
    }>(name);
    const sides = [...new Set(data[group])].map((one) =>
      side(data[value].filter((_, index) => data[group][index] === one) as number[]),
    );
    const result = welchAnova(sides);
    close(result?.statistic, results.welch_oneway.F, 1e-10);
    close(result?.degreesOfFreedom[1], results.welch_oneway.df2, 1e-10);
    close(result?.p, results.welch_oneway.p, 1e-9);
  });
  it('steps stop at the first that fails, and those after fail with it', () => {
    const steps = holm([0.01, 0.04, 0.03, 0.005], 0.05);
    expect(steps.map(({ adjusted }) => Number(adjusted.toFixed(3)))).toEqual([0.03, 0.06, 0.06, 0.02]);
    expect([0.01, 0.04, 0.03, 0.005].map((p, index) => p < steps[index].level)).toEqual([
      true,
      false,
      false,
      true,
    ]);
  });
});

describe('one mount each and the bench’s past', () => {
  it('standard error, degrees of freedom, interval and p', () => {
    const { input, expected } = example('O3');
    const { A, B, hist_sd_of_mount_means, hist_df } = input as unknown as {
      A: number[];
      B: number[];
      hist_sd_of_mount_means: number;
      hist_df: number;
    };
    const [pair] = judge(
      judgementInput([remountedCooler('B', [B]), remountedCooler('A', [A])], {
        bench: { mountSpread: hist_sd_of_mount_means, mountSpreadDegreesOfFreedom: hist_df },
      }),
    ).pairs;
    close(pair.gap, expected['gap'], 1e-9);
    close(pair.standardError, expected['se'], 1e-9);
    close(pair.degreesOfFreedom, expected['df'], 1e-9);
    close(pair.p, expected['p'], 1e-9);
    close(pair.interval?.[0], expected['ci95_lo'], 1e-9);
    close(pair.interval?.[1], expected['ci95_hi'], 1e-9);
    close(pair.naive?.p, expected['runs_only_p'], 1e-9);
    close(pair.tippingMountSpread, expected['tipping_mount_sd'], 1e-9);
  });
});

describe('outliers', () => {
  it("Grubbs' critical values, by the formula (relative 1e-12) and as published (0.001)", () => {
    const { rows, published } = reference<{
      rows: { N: number; two_sided_05: number; two_sided_01: number }[];
      published: { two_sided_05: Record<string, number> };
    }>('grubbs_critical');
    const worst = worstOf(
      rows.flatMap(
        (row) =>
          [
            [`N ${row.N} 5 %`, grubbsCritical(row.N, 0.05), row.two_sided_05],
            [`N ${row.N} 1 %`, grubbsCritical(row.N, 0.01), row.two_sided_01],
          ] as const,
      ),
    );
    expect(worst.error < 1e-12 ? 'close' : worst).toBe('close');
    for (const [n, value] of Object.entries(published.two_sided_05))
      expect(Math.abs(grubbsCritical(Number(n), 0.05) - value)).toBeLessThanOrEqual(0.001);
  });
  it('uranium isotope data of Tietjen and Moore 1972 (NIST/SEMATECH e-Handbook 1.3.5.17.1)', () => {
    const { data, computed } = reference<{ data: number[]; computed: { G: number } }>('nist_grubbs');
    close(grubbsStatistic(data), computed.G, 1e-11);
    expect(outliers(data, 0.05)).toEqual([7]);
  });
  it('two that hide each other are both found', () => {
    const quiet = [40.1, 40.2, 40.0, 40.3, 40.1, 40.2, 39.9, 40.0, 40.1, 40.2, 40.1, 40.0, 40.2];
    expect(outliers([...quiet, 44, 44.1], 0.05).sort((a, b) => a - b)).toEqual([13, 14]);
    expect(outliers(quiet, 0.05)).toEqual([]);
  });
});

describe('end gauge calibration, JCGM 100:2008 H.1', () => {
  const { computed_from_inputs: known } = reference<{
    computed_from_inputs: {
      contributions_nm: number[];
      u_c: number;
      u_d: number;
      nu_d: number;
      nu_eff: number;
    };
  }>('gum_h1_end_gauge');
  it('combined standard uncertainty and effective degrees of freedom', () => {
    const d = combine(
      [
        { uncertainty: 5.8, degreesOfFreedom: 24 },
        { uncertainty: 3.9, degreesOfFreedom: 5 },
        { uncertainty: 6.7, degreesOfFreedom: 8 },
      ],
      0.99,
    );
    close(d.standardUncertainty, known.u_d, 1e-10);
    close(d.degreesOfFreedom, known.nu_d, 1e-10);
    const [ls, , deltaAlpha, deltaTheta] = known.contributions_nm;
    const whole = combine(
      [
        { uncertainty: ls, degreesOfFreedom: 18 },
        { uncertainty: d.standardUncertainty, degreesOfFreedom: d.degreesOfFreedom },
        { uncertainty: deltaAlpha, degreesOfFreedom: 50 },
        { uncertainty: deltaTheta, degreesOfFreedom: 2 },
      ],
      0.99,
    );
    close(whole.standardUncertainty, known.u_c, 1e-10);
    close(whole.degreesOfFreedom, known.nu_eff, 1e-10);
    // Published, rounded: u_c = 32 nm, ν_eff = 16 and k₉₉ = 2.92 with ν cut to 16.
    expect(Math.round(whole.standardUncertainty)).toBe(32);
    expect(Math.floor(whole.degreesOfFreedom)).toBe(16);
  });
  it('standard uncertainty of a stated half-width (4.3)', () => {
    close(standardUncertainty(2e-6, 'rectangular'), 1.1547005383792516e-6, 1e-15);
    close(standardUncertainty(3, 'triangular'), 3 / Math.sqrt(6), 1e-15);
  });
});

describe('the quick power integral', () => {
  it.each([
    [3, 4.2957260981],
    [10, 2.97860968463],
  ])('smallest visible gap of %i against %i units in standard errors', (units, expected) => {
    const one = { variance: units / 2, units };
    close(quickWelchPower(one, one, { confidence: 0.95 })?.gapAt(0.8), expected, 1e-8);
  });
  it.each([
    [5, 3.2956],
    [20, 2.8783],
  ])('and of %i, to four decimals', (units, expected) => {
    const one = { variance: units / 2, units };
    expect(quickWelchPower(one, one, { confidence: 0.95 })?.gapAt(0.8)).toBeCloseTo(expected, 4);
  });
  it('is the slow one to 1e-8, whatever the spreads and numbers', () => {
    for (const [n1, n2, v2] of [
      [2, 2, 9],
      [3, 3, 16],
      [4, 9, 9],
      [3, 30, 4],
      [60, 60, 2],
    ]) {
      const [a, b] = [
        { variance: 1, units: n1 },
        { variance: v2, units: n2 },
      ];
      const slow = welchPower(a, b, 0.95);
      const quick = quickWelchPower(a, b, { confidence: 0.95 });
      close(quick?.gapAt(0.8), slow?.gapAt(0.8) ?? NaN, 1e-8);
      close(quick?.powerAt(1), slow?.powerAt(1) ?? NaN, 1e-8);
    }
  });
});
