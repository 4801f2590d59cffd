import { nestedComponents, NestedReadings, oneWayAnalysis, oneWayComponents } from '../../shared/numerics';
import { groupBy, nestBy, shuffled } from '../support/grouping';
import { expectClose, reference } from '../support/reference';

/** High-precision REML solutions: Fisher scoring in 30 digits with mpmath; `how` in each file. */
interface Reml {
  readonly mean: number;
  readonly se_mean: number;
  readonly loglik_REML: number;
}
interface DyestuffFile {
  readonly data: { readonly Batch: string[]; readonly Yield: number[] };
  readonly tolerance: Record<string, number>;
  readonly results: {
    readonly anova_var_between_unclipped: number;
    readonly anova_var_within: number;
    readonly mean: number;
    readonly se_mean: number;
    readonly lme4_REML: Reml & { var_between: number; var_within: number };
    readonly REML_closed_form?: { var_between: number; var_within: number };
    readonly REML_high_precision?: Reml & { var_between: number; var_within: number };
  };
}
const dyestuff = (name: string) => {
  const { data, results } = reference<DyestuffFile>(name);
  return { groups: groupBy(data.Batch, data.Yield), results };
};

describe('one-way components', () => {
  it.each(['dyestuff', 'dyestuff2'])('%s, balanced: the closed form to 1e-9', (name) => {
    const { groups, results } = dyestuff(name);
    const got = oneWayComponents(groups);
    const closed = results.REML_closed_form;
    expectClose(got.within, closed?.var_within, 1e-9);
    expectClose(got.between, closed?.var_between, 1e-9);
    expectClose(got.mean, results.mean, 1e-12);
    expectClose(got.standardError, results.se_mean, 1e-9);
    expectClose(got.logLikelihood, results.lme4_REML.loglik_REML, 1e-12);
  });

  it('dyestuff_unbalanced: the high-precision solution to 1e-9', () => {
    const { groups, results } = dyestuff('dyestuff_unbalanced');
    const got = oneWayComponents(groups);
    const expected = results.REML_high_precision;
    expectClose(got.within, expected?.var_within, 1e-9);
    expectClose(got.between, expected?.var_between, 1e-9);
    expectClose(got.mean, expected?.mean, 1e-12);
    expectClose(got.standardError, expected?.se_mean, 1e-9);
    expectClose(got.logLikelihood, expected?.loglik_REML, 1e-12);
  });

  it.each(['dyestuff', 'dyestuff2', 'dyestuff_unbalanced'])('%s: unbiased estimates', (name) => {
    const { groups, results } = dyestuff(name);
    const { unbiased } = oneWayComponents(groups);
    // R prints 15 digits; the difference of mean squares loses one or two of them.
    expectClose(unbiased.between, results.anova_var_between_unclipped, 1e-12);
    expectClose(unbiased.within, results.anova_var_within, 1e-12);
  });

  it('a component that would be negative is 0, never NaN', () => {
    const { groups } = dyestuff('dyestuff2');
    expect(oneWayComponents(groups).between).toBe(0);
    expect(oneWayComponents(groups).unbiased.between).toBeLessThan(0);
  });

  it('Michelson’s experiments: restricted likelihood as in lme4', () => {
    interface MorleyFile {
      readonly data: { readonly Expt: number[]; readonly Speed: number[] };
      readonly results: { readonly random_effects: DyestuffFile['results'] };
    }
    const { data, results } = reference<MorleyFile>('morley');
    const got = oneWayComponents(groupBy(data.Expt, data.Speed));
    expectClose(got.between, results.random_effects.lme4_REML.var_between, 1e-6);
    expectClose(got.within, results.random_effects.lme4_REML.var_within, 1e-6);
  });

  it('no digit changes when readings and groups are shuffled, and an offset costs none', () => {
    const { groups } = dyestuff('dyestuff_unbalanced');
    const got = oneWayComponents(groups);
    expect(oneWayComponents(shuffled(groups.map(shuffled)))).toEqual(got);
    const far = oneWayComponents(groups.map((group) => group.map((value) => value + 2 ** 40)));
    expect([far.between, far.within, far.standardError]).toEqual([
      got.between,
      got.within,
      got.standardError,
    ]);
  });

  it('what the data cannot tell apart is NaN; groups without inner spread leave only the outer one', () => {
    expect(oneWayComponents([[1], [2], [4]])).toMatchObject({ between: NaN, within: NaN });
    expect(oneWayComponents([[1, 2, 3]])).toMatchObject({ between: NaN, within: 1 });
    expect(oneWayComponents([])).toMatchObject({ between: NaN, within: NaN });
    expect(oneWayComponents([[1, 1], [2, 2, 2], [6]])).toMatchObject({ between: 7, within: 0, mean: 3 });
    expect(
      oneWayComponents([
        [1, 1],
        [1, 1],
      ]),
    ).toMatchObject({ between: 0, within: 0, mean: 1 });
  });
});

describe('nested components', () => {
  interface OxideFile {
    readonly data: { readonly Lot: string[]; readonly Wafer: string[]; readonly Thickness: number[] };
    readonly results: {
      readonly mean: number;
      readonly se_mean: number;
      readonly anova_variance: { A: number; B_in_A: number; residual: number };
      readonly lme4_REML: { loglik_REML: number };
      readonly REML_high_precision: Reml & { Lot: number; Wafer_in_Lot: number; residual: number };
    };
  }
  const oxide = (name: string) => {
    const { data, results } = reference<OxideFile>(name);
    return { lots: nestBy(data.Lot, data.Wafer, data.Thickness), results };
  };

  it('oxide, balanced: the closed form to 1e-9', () => {
    const { lots, results } = oxide('oxide');
    const got = nestedComponents(lots);
    for (const parts of [got, got.unbiased]) {
      expectClose(parts.outer, results.anova_variance.A, 1e-9);
      expectClose(parts.inner, results.anova_variance.B_in_A, 1e-9);
      expectClose(parts.residual, results.anova_variance.residual, 1e-9);
    }
    expectClose(got.mean, results.mean, 1e-12);
    expectClose(got.standardError, results.se_mean, 1e-9);
    expectClose(got.logLikelihood, results.lme4_REML.loglik_REML, 1e-11);
  });

  it('oxide_unbalanced: the high-precision solution to 1e-9', () => {
    const { lots, results } = oxide('oxide_unbalanced');
    const got = nestedComponents(lots);
    const expected = results.REML_high_precision;
    expectClose(got.outer, expected.Lot, 1e-9);
    expectClose(got.inner, expected.Wafer_in_Lot, 1e-9);
    expectClose(got.residual, expected.residual, 1e-9);
    expectClose(got.mean, expected.mean, 1e-12);
    expectClose(got.standardError, expected.se_mean, 1e-9);
    expectClose(got.logLikelihood, expected.loglik_REML, 1e-12);
  });

  it('changes no digit when everything is shuffled', () => {
    const { lots } = oxide('oxide_unbalanced');
    const mixed = shuffled(lots.map((wafers) => shuffled(wafers.map(shuffled))));
    expect(nestedComponents(mixed)).toEqual(nestedComponents(lots));
  });

  it('is unbiased for any numbers of readings: each component’s own unit vectors give it 1, the others 0', () => {
    // E[y'Qy] of independent effects is the sum of Q over the effects' indicator vectors.
    const shape = [
      [3, 1, 2],
      [2, 2],
      [4, 1, 1, 5],
      [1, 2],
    ];
    const total = { outer: [0, 0, 0], inner: [0, 0, 0], residual: [0, 0, 0] };
    const indicator = (mark: (lot: number, wafer: number, reading: number) => boolean): NestedReadings =>
      shape.map((wafers, lot) =>
        wafers.map((count, wafer) =>
          Array.from({ length: count }, (_, reading) => Number(mark(lot, wafer, reading))),
        ),
      );
    const collect = (kind: keyof typeof total, design: NestedReadings): void => {
      const { outer, inner, residual } = nestedComponents(design).unbiased;
      [outer, inner, residual].forEach((value, index) => (total[kind][index] += value));
    };
    shape.forEach((wafers, lot) => {
      collect(
        'outer',
        indicator((l) => l === lot),
      );
      wafers.forEach((count, wafer) => {
        collect(
          'inner',
          indicator((l, w) => l === lot && w === wafer),
        );
        for (let reading = 0; reading < count; reading++) {
          collect(
            'residual',
            indicator((l, w, r) => l === lot && w === wafer && r === reading),
          );
        }
      });
    });
    const rounded = (values: number[]) => values.map((value) => Number(value.toFixed(12)) + 0);
    expect(rounded(total.outer)).toEqual([1, 0, 0]);
    expect(rounded(total.inner)).toEqual([0, 1, 0]);
    expect(rounded(total.residual)).toEqual([0, 0, 1]);
  });

  it('keeps components at 0 when the data pull them below', () => {
    // Every wafer and lot has the same mean, so only the residual is left: 24 squares of 1 over 23 degrees of freedom.
    const lots = Array.from({ length: 3 }, () => Array.from({ length: 4 }, () => [-1, 1]));
    const got = nestedComponents(lots);
    expect(got).toMatchObject({ outer: 0, inner: 0, mean: 0 });
    expectClose(got.residual, 24 / 23, 1e-12);
  });

  it('what the data cannot tell apart is NaN; wafers without spread leave the outer two', () => {
    expect(nestedComponents([[[1, 2]], [[3, 4]]])).toMatchObject({ outer: NaN, inner: NaN });
    const still = nestedComponents([
      [
        [1, 1],
        [3, 3],
      ],
      [
        [5, 5],
        [9, 9],
      ],
    ]);
    const ofMeans = oneWayComponents([
      [1, 3],
      [5, 9],
    ]);
    expect(still).toMatchObject({ outer: ofMeans.between, inner: ofMeans.within, residual: 0 });
  });
});

describe('crossed designs, balanced: closed forms from the same sums', () => {
  const between = (labels: readonly string[], readings: readonly number[]): number =>
    oneWayAnalysis(groupBy(labels, readings)).between.sumOfSquares;

  it('penicillin: 24 plates × 6 samples (R 4.2.2, lme4 1.1-31)', () => {
    interface File {
      readonly data: { readonly plate: string[]; readonly sample: string[]; readonly diameter: number[] };
      readonly results: {
        readonly anova: { MS_plate: number; MS_sample: number; MS_res: number };
        readonly anova_variance: { plate: number; sample: number; residual: number };
      };
    }
    const { data, results } = reference<File>('penicillin');
    const plates = between(data.plate, data.diameter);
    const samples = between(data.sample, data.diameter);
    const all = oneWayAnalysis([data.diameter]).within.sumOfSquares;
    const residual = (all - plates - samples) / 115;
    expectClose(plates / 23, results.anova.MS_plate, 1e-12);
    expectClose(samples / 5, results.anova.MS_sample, 1e-12);
    expectClose(residual, results.anova.MS_res, 1e-12);
    expectClose((plates / 23 - residual) / 6, results.anova_variance.plate, 1e-12);
    expectClose((samples / 5 - residual) / 24, results.anova_variance.sample, 1e-12);
  });

  it('machines: 3 machines × 6 workers with interaction (R 4.2.2, lme4 1.1-31)', () => {
    interface File {
      readonly data: { readonly Worker: string[]; readonly Machine: string[]; readonly score: number[] };
      readonly results: {
        readonly MS: { machine: number; worker: number; interaction: number; residual: number };
        readonly anova_variance: { worker: number; interaction: number; residual: number };
      };
    }
    const { data, results } = reference<File>('machines');
    const cells = oneWayAnalysis(
      groupBy(
        data.Worker.map((worker, index) => `${worker} ${data.Machine[index]}`),
        data.score,
      ),
    );
    const machine = between(data.Machine, data.score);
    const worker = between(data.Worker, data.score);
    const interaction = (cells.between.sumOfSquares - machine - worker) / 10;
    expectClose(machine / 2, results.MS.machine, 1e-12);
    expectClose(worker / 5, results.MS.worker, 1e-12);
    expectClose(interaction, results.MS.interaction, 1e-12);
    expectClose(cells.within.meanSquare, results.MS.residual, 1e-12);
    expectClose((interaction - cells.within.meanSquare) / 3, results.anova_variance.interaction, 1e-12);
    expectClose((worker / 5 - interaction) / 9, results.anova_variance.worker, 1e-12);
  });
});
