import * as n from '../../shared/numerics';
import { reference, Worst, worstOf } from '../support/reference';

/** Sources and tolerances of the values stand in the files of reference-data/ themselves. */
interface Table {
  readonly tolerance: { readonly rel?: number; readonly rel_sf?: number };
  readonly rows: readonly (readonly number[])[];
}
interface TTails {
  readonly tolerance: { readonly rel: number };
  readonly rows: readonly {
    df: number;
    t: number;
    p_lower_tail_at_minus_t: number;
    pdf: number;
    p_two_sided: number;
  }[];
}
interface TQuantiles {
  readonly tolerance: { readonly rel: number };
  readonly rows: readonly { df: number; p: number; t: number }[];
}

const expectWithin = (worst: Worst, tolerance: number): void => {
  expect(worst.error <= tolerance ? 'within' : `${worst.error} at ${worst.where}`).toBe('within');
};

describe('Student t', () => {
  const tails = reference<TTails>('t_tails');
  it('tails', () => {
    expectWithin(
      worstOf(
        tails.rows.map((r) => [`df ${r.df} t ${r.t}`, n.studentTail(r.t, r.df), r.p_lower_tail_at_minus_t]),
      ),
      tails.tolerance.rel,
    );
  });
  it('two-sided p', () => {
    expectWithin(
      worstOf(tails.rows.map((r) => [`df ${r.df} t ${r.t}`, n.studentTwoSided(-r.t, r.df), r.p_two_sided])),
      tails.tolerance.rel,
    );
  });
  it('density', () => {
    expectWithin(
      worstOf(tails.rows.map((r) => [`df ${r.df} t ${r.t}`, n.studentDensity(r.t, r.df), r.pdf])),
      tails.tolerance.rel,
    );
  });
  it('quantiles', () => {
    const table = reference<TQuantiles>('t_quantiles');
    expectWithin(
      worstOf(table.rows.map((r) => [`df ${r.df} p ${r.p}`, n.studentQuantile(r.p, r.df), r.t])),
      table.tolerance.rel,
    );
  });
  it('is the normal at infinite degrees of freedom', () => {
    expect(n.studentQuantile(0.975, Infinity)).toBe(n.normalQuantile(0.975));
    expect(n.studentTail(2, Infinity)).toBe(n.normalTail(2));
  });
  it('takes degrees of freedom below one', () => {
    for (const p of [0.9, 0.975, 0.999]) {
      expect(1 - n.studentTail(n.studentQuantile(p, 0.5), 0.5)).toBeCloseTo(p, 12);
    }
  });
  it('keeps symmetry and answers NaN off the domain', () => {
    expect(n.studentTail(-1.5, 7) + n.studentTail(1.5, 7)).toBe(1);
    expect(n.studentTail(1, 0)).toBeNaN();
    expect(n.studentQuantile(1.2, 5)).toBeNaN();
  });
});

const tableTest = (
  name: string,
  checks: Record<string, (row: readonly number[]) => readonly [got: number, expected: number]>,
): void => {
  describe(name, () => {
    const table = reference<Table>(name);
    const tolerance = table.tolerance.rel ?? table.tolerance.rel_sf ?? 0;
    for (const [what, check] of Object.entries(checks)) {
      it(what, () => {
        expectWithin(
          worstOf(table.rows.map((row) => [row.slice(0, 3).join(' '), ...check(row)] as const)),
          tolerance,
        );
      });
    }
  });
};

tableTest('normal_cdf', {
  cdf: ([x, cdf]) => [n.normalCdf(x), cdf],
  density: ([x, , pdf]) => [n.normalDensity(x), pdf],
});
tableTest('normal_quantiles', { quantile: ([p, x]) => [n.normalQuantile(p), x] });
tableTest('beta_cdf', {
  lower: ([a, b, x, lower]) => [n.betaTails(x, 1 - x, a, b).lower, lower],
  upper: ([a, b, x, , upper]) => [n.betaTails(x, 1 - x, a, b).upper, upper],
});
tableTest('chi2_tails', {
  lower: ([df, x, lower]) => [n.chiSquareCdf(x, df), lower],
  upper: ([df, x, , upper]) => [n.chiSquareTail(x, df), upper],
});
tableTest('chi2_quantiles', { quantile: ([df, p, x]) => [n.chiSquareQuantile(p, df), x] });
tableTest('f_tails', {
  lower: ([df1, df2, x, lower]) => [n.fCdf(x, df1, df2), lower],
  upper: ([df1, df2, x, , upper]) => [n.fTail(x, df1, df2), upper],
});
tableTest('f_quantiles', { quantile: ([df1, df2, p, x]) => [n.fQuantile(p, df1, df2), x] });
tableTest('noncentral_t', {
  lower: ([df, ncp, t, cdf]) => [n.noncentralTTails(t, df, ncp).lower, cdf],
  upper: ([df, ncp, t, , sf]) => [n.noncentralTTails(t, df, ncp).upper, sf],
});
tableTest('studentized_range_tails', {
  upper: ([k, df, q, , sf]) => [n.studentizedRangeTail(q, k, df), sf],
});
tableTest('studentized_range_quantiles', {
  quantile: ([k, df, p, q]) => [n.studentizedRangeQuantile(p, k, df), q],
});

describe('studentized range of two groups', () => {
  // Q = √2 |T| exactly: the only independent reference below three degrees of freedom.
  const freedoms = [0.5, 1, 1.2, 1.5, 1.9, 2.5, 4, 7.7, 20, 63, 300, 5000, 1e6, Infinity];
  const cases = (points: readonly number[]) =>
    freedoms.flatMap((df) => points.map((point) => ({ df, point, where: `df ${df} at ${point}` })));
  it('has the tail of Student t', () => {
    const rows = cases([0.01, 0.3, 1, 2, 3.5, 5, 8, 12, 20, 50, 300]).map(
      ({ df, point, where }) =>
        [where, n.studentizedRangeTail(point, 2, df), n.studentTwoSided(point / Math.SQRT2, df)] as const,
    );
    expectWithin(worstOf(rows.filter(([, , expected]) => expected > 1e-14)), 1e-10);
  });
  it('has the quantile of Student t', () => {
    // Dyadic shares, so that 1 − p and p/2 are exact.
    const rows = cases([2 ** -10, 0.25, 0.5, 0.875, 1 - 2 ** -5, 1 - 2 ** -10, 1 - 2 ** -20]).map(
      ({ df, point, where }) =>
        [
          where,
          n.studentizedRangeQuantile(point, 2, df),
          Math.SQRT2 * n.studentQuantile(0.5 + point / 2, df),
        ] as const,
    );
    expectWithin(worstOf(rows), 1e-10);
  });
  it('answers NaN off the domain', () => {
    expect(n.studentizedRangeTail(3, 1, 10)).toBeNaN();
    expect(n.studentizedRangeTail(3, 2.5, 10)).toBeNaN();
    expect(n.studentizedRangeTail(3, 3, 0)).toBeNaN();
    expect(n.studentizedRangeQuantile(1.1, 3, 10)).toBeNaN();
    expect(n.studentizedRangeTail(-1, 3, 10)).toBe(1);
  });
});
