import { nestedAnalysis, oneWayAnalysis } from '../../shared/numerics';
import { groupBy, nestBy, shuffled } from '../support/grouping';
import { expectClose, reference } from '../support/reference';

/** NIST Statistical Reference Datasets, analysis of variance: https://www.itl.nist.gov/div898/strd. */
interface StrdFile {
  readonly certified: Record<
    | 'df_between'
    | 'df_within'
    | 'SS_between'
    | 'SS_within'
    | 'MS_between'
    | 'MS_within'
    | 'F'
    | 'R_squared'
    | 'residual_sd',
    number
  >;
  readonly exact_from_ieee_doubles: Record<'SS_between' | 'SS_within' | 'F', number>;
  readonly data?: { readonly group: readonly number[]; readonly y: readonly number[] };
  readonly rule?: {
    readonly per_group: number;
    readonly first_three_by_group: Record<string, readonly string[]>;
  };
}

/** As published, or from the generating rule: a first reading, then two alternating. */
function strdGroups({ data, rule }: StrdFile): number[][] {
  if (data) return groupBy(data.group, data.y);
  return Object.values(rule?.first_three_by_group ?? {}).map((texts) => {
    const [first, low, high] = texts.map(Number);
    return Array.from({ length: rule?.per_group ?? 0 }, (_, index) =>
      index === 0 ? first : index % 2 === 1 ? low : high,
    );
  });
}

describe.each(['sirstv', 'smls01', 'smls03', 'smls04', 'smls06', 'smls07', 'smls09'])('StRD %s', (name) => {
  const file = reference<StrdFile>(`strd_anova_${name}`);
  const { certified, exact_from_ieee_doubles: exact } = file;
  const groups = strdGroups(file);
  const analysis = oneWayAnalysis(groups);

  it('has every certified figure to its last printed digit, the readings being decimals', () => {
    const { between, within } = analysis;
    expect(between.degreesOfFreedom).toBe(certified.df_between);
    expect(within.degreesOfFreedom).toBe(certified.df_within);
    // The certificates print 15 digits.
    const pairs = [
      [analysis.f, certified.F],
      [between.sumOfSquares, certified.SS_between],
      [within.sumOfSquares, certified.SS_within],
      [between.meanSquare, certified.MS_between],
      [within.meanSquare, certified.MS_within],
      [Math.sqrt(within.meanSquare), certified.residual_sd],
      [between.sumOfSquares / (between.sumOfSquares + within.sumOfSquares), certified.R_squared],
    ];
    for (const [got, expected] of pairs) expect(Number(got.toPrecision(15))).toBe(expected);
  });

  it('has the exact figures of the doubles when they are no decimals', () => {
    // A power of two changes no digit of a double, but so small a one leaves no short decimal.
    const { between, within, f } = oneWayAnalysis(
      groups.map((each) => each.map((value) => value * 2 ** -60)),
    );
    expectClose(f, exact.F, 1e-14);
    expectClose(between.sumOfSquares * 2 ** 120, exact.SS_between, 1e-14);
    expectClose(within.sumOfSquares * 2 ** 120, exact.SS_within, 1e-14);
  });

  it('changes no digit when readings and groups are shuffled', () => {
    expect(oneWayAnalysis(shuffled(groups.map(shuffled)))).toEqual(analysis);
  });
});

describe.each([
  ['chickwts', 'feed', 'weight'],
  ['plantgrowth', 'group', 'weight'],
  ['airquality_ozone_by_month', 'Month', 'Ozone'],
  ['morley', 'Expt', 'Speed'],
] as const)('%s (R 4.2.2, aov; data set shipped with R)', (name, label, reading) => {
  interface RFile {
    readonly data: Record<string, readonly number[]>;
    readonly tolerance: { readonly rel_statistics: number; readonly rel_p_values: number };
    readonly results: {
      readonly anova: { df: number[]; SS: number[]; MS: number[]; F: number; p: number };
    };
  }
  it('has its table', () => {
    const { data, tolerance, results } = reference<RFile>(name);
    const { between, within, f, p } = oneWayAnalysis(groupBy(data[label], data[reading]));
    const { anova } = results;
    expect([between.degreesOfFreedom, within.degreesOfFreedom]).toEqual(anova.df);
    expectClose(between.sumOfSquares, anova.SS[0], tolerance.rel_statistics);
    expectClose(within.sumOfSquares, anova.SS[1], tolerance.rel_statistics);
    expectClose(between.meanSquare, anova.MS[0], tolerance.rel_statistics);
    expectClose(within.meanSquare, anova.MS[1], tolerance.rel_statistics);
    expectClose(f, anova.F, tolerance.rel_statistics);
    expectClose(p, anova.p, tolerance.rel_p_values);
  });
});

describe('nested analysis', () => {
  interface OxideFile {
    readonly data: { readonly Lot: string[]; readonly Wafer: string[]; readonly Thickness: number[] };
    readonly results: { readonly SS: number[]; readonly df: number[]; readonly MS: number[] };
  }
  it('has the table of the oxide data (R 4.2.2, nlme 3.1-162)', () => {
    const { data, results } = reference<OxideFile>('oxide');
    const { outer, inner, residual } = nestedAnalysis(nestBy(data.Lot, data.Wafer, data.Thickness));
    [outer, inner, residual].forEach((source, index) => {
      expect(source.degreesOfFreedom).toBe(results.df[index]);
      expectClose(source.sumOfSquares, results.SS[index], 1e-12);
      expectClose(source.meanSquare, results.MS[index], 1e-12);
    });
  });
});

describe('analysis of variance off its domain', () => {
  it('says so by NaN and ∞, and leaves empty groups out', () => {
    expect(oneWayAnalysis([[1, 2, 3]]).f).toBeNaN();
    expect(oneWayAnalysis([[1], [2]]).f).toBeNaN();
    expect(
      oneWayAnalysis([
        [5, 5],
        [5, 5],
      ]).f,
    ).toBeNaN();
    expect(
      oneWayAnalysis([
        [1, NaN],
        [2, 3],
      ]).between.sumOfSquares,
    ).toBeNaN();
    expect(oneWayAnalysis([])).toMatchObject({ f: NaN, p: NaN });
    expect(
      oneWayAnalysis([
        [1, 1],
        [2, 2],
      ]),
    ).toMatchObject({ f: Infinity, p: 0 });
    expect(oneWayAnalysis([[1, 2], [], [3, 5]])).toEqual(
      oneWayAnalysis([
        [1, 2],
        [3, 5],
      ]),
    );
  });
});
