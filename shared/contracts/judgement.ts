import * as z from 'zod';
import { metricSchema } from './common';
import { findingLevelSchema } from './run-summary';

const nullableNumber = z.number().nullable();

/** The lead's rules for a call. `gapThatMatters` is in °C; for resistance it is divided by the median power. */
export const thresholdValuesSchema = z.object({
  confidence: z.number().gt(0.5).lt(1),
  power: z.number().gt(0.5).lt(1),
  gapThatMatters: z.number().positive(),
});
export type ThresholdValues = z.infer<typeof thresholdValuesSchema>;

/** What the bench's past tells about remounting: SD of historic mount means, °C, and its degrees of freedom. */
export const benchHistorySchema = z.object({
  mountSpread: z.number().positive(),
  mountSpreadDegreesOfFreedom: z.number().positive(),
});
export type BenchHistory = z.infer<typeof benchHistorySchema>;

/** One run as the judgement sees it. `value` is in the metric's unit; the rest feeds the findings and may be unknown. */
export const judgedRunSchema = z.object({
  name: z.string(),
  value: z.number(),
  order: z.number().nullable().describe('Place in the order of testing over the whole study, from 1.'),
  ambient: z.number().nullable().describe('°C'),
  ambientRange: z.number().nullable().describe('Highest minus lowest ambient in the window, °C.'),
  watts: z.number().nullable().describe('W'),
  fanSpeed: z.number().nullable().describe('rpm'),
  settled: z.enum(['settled', 'nearly settled', 'not settled', 'no trace']),
  windowSetByHand: z.boolean(),
  sensorStep: z.number().nullable().describe('°C'),
  withinStandardDeviation: z.number().nullable().describe('Of the rise inside the window, °C.'),
  digest: z.string().nullable().describe('SHA-256 of the raw file, hexadecimal.'),
});
export type JudgedRun = z.infer<typeof judgedRunSchema>;

export const judgedMountSchema = z.object({ name: z.string(), runs: z.array(judgedRunSchema) });
export type JudgedMount = z.infer<typeof judgedMountSchema>;

/** A cooler's evidence. `mountsRecorded` false: one nameless mount holds all runs and nothing is known of remounting. */
export const judgedCoolerSchema = z.object({
  name: z.string(),
  mountsRecorded: z.boolean(),
  mounts: z.array(judgedMountSchema),
});
export type JudgedCooler = z.infer<typeof judgedCoolerSchema>;

export const leftOutRunSchema = z.object({
  cooler: z.string(),
  mount: z.string().nullable(),
  run: judgedRunSchema,
  reason: z.string(),
});

/** A source of doubt that the runs themselves don't show, such as a sensor's calibration. Source of the terms: JCGM 100:2008. */
export const statedUncertaintySchema = z.object({
  source: z.string().min(1),
  kind: z.enum(['additive', 'gain']).describe('In the unit of the metric, or as a share of the reading.'),
  value: z.number().positive().describe('Half-width; for `normal` the standard uncertainty.'),
  distribution: z.enum(['normal', 'rectangular', 'triangular', 'U-shaped']),
  degreesOfFreedom: nullableNumber.describe('null: taken as certain.'),
  varies: z
    .enum(['never', 'per cooler', 'per mount', 'per run'])
    .describe('How often it takes a new value. What never varies and is additive cancels in a gap.'),
});
export type StatedUncertainty = z.infer<typeof statedUncertaintySchema>;

/** All that a judgement depends on. The same input gives the same bits. */
export const judgementInputSchema = z.object({
  metric: metricSchema,
  thresholds: thresholdValuesSchema,
  bench: benchHistorySchema.nullable(),
  nominalWatts: z.number().positive().nullable(),
  seed: z.number().int(),
  coolers: z
    .array(judgedCoolerSchema)
    .min(2)
    .describe('In the order of comparison: gaps are earlier minus later, so the reference comes last.'),
  leftOut: z.array(leftOutRunSchema),
  uncertainties: z.array(statedUncertaintySchema).optional(),
});
export type JudgementInput = z.infer<typeof judgementInputSchema>;

export const flagSchema = z.enum(['within noise', 'outside noise', 'not judged']);
export type Flag = z.infer<typeof flagSchema>;
export const sizeCallSchema = z.enum(['matters', 'too small to matter', 'size open']);
export type SizeCall = z.infer<typeof sizeCallSchema>;
/** What the verdict's evidence reaches: remounting seen, remounting borrowed from the bench, or runs of one mount only. */
export const scopeSchema = z.enum(['mounts', 'bench history', 'runs only']);
export type Scope = z.infer<typeof scopeSchema>;

/** Why there is no call, for a program; the words are in `reason`. */
export const notJudgedCodeSchema = z.enum([
  'single run each',
  'too few runs',
  'no spread measured',
  'mixed mounts',
  'history too short',
  'order confounded',
  'refused',
]);
export type NotJudgedCode = z.infer<typeof notJudgedCodeSchema>;

/** Evidence of one cooler, in the metric's unit. */
export const coolerResultSchema = z.object({
  name: z.string(),
  runs: z.number().int(),
  mounts: z.number().int().nullable().describe('null when mounts were not recorded'),
  mean: nullableNumber.describe('Unweighted mean of the units of evidence (mount means, or runs).'),
  standardDeviation: nullableNumber.describe('Of the units of evidence.'),
  units: z.number().int().describe('Number of units of evidence.'),
  standardError: nullableNumber,
  interval: z
    .tuple([z.number(), z.number()])
    .nullable()
    .describe("Of this cooler's mean alone, at the thresholds' confidence."),
  spreadBetweenRuns: nullableNumber.describe('Pooled SD of runs inside a mount.'),
  spreadBetweenMounts: nullableNumber.describe(
    'SD component between mounts, 0 when the estimate is negative.',
  ),
  spreadBetweenMountsTruncated: z.boolean(),
  mountMeans: z.array(z.object({ name: z.string(), mean: z.number(), runs: z.number().int() })),
});
export type CoolerResult = z.infer<typeof coolerResultSchema>;

/** What Welch's test on all runs would have said, mounts ignored: shown beside the call, never instead of it. */
export const naiveResultSchema = z.object({
  gap: z.number(),
  standardError: z.number(),
  degreesOfFreedom: z.number(),
  p: z.number(),
  marginOfError: z.number(),
});

/** One line of a pair's uncertainty budget, in the metric's unit. */
export const budgetLineSchema = z.object({
  source: z.string(),
  uncertainty: z.number().describe('Standard uncertainty of the gap from this source; 0 where it cancels.'),
  degreesOfFreedom: nullableNumber.describe('null: taken as certain.'),
  note: z.string().nullable(),
});

/** What methods numbered 2 add to a pair; absent in judgements by earlier ones. */
const furtherPairFields = {
  basis: z
    .enum(['mounts', 'runs', 'bench history', 'borrowed mounts'])
    .nullable()
    .optional()
    .describe('Where the noise comes from; borrowed: one cooler was remounted and stands for both.'),
  permutation: z
    .object({ p: z.number(), arrangements: z.number().int(), exact: z.boolean(), agrees: z.boolean() })
    .nullable()
    .optional()
    .describe("Second opinion: permutation of Welch's t over the units of evidence."),
  trimmed: z
    .object({ gap: z.number(), p: z.number(), agrees: z.boolean() })
    .nullable()
    .optional()
    .describe("Yuen's test of 20 % trimmed means: whether single units drive the call."),
  adjustedP: nullableNumber.optional().describe("Holm's, over all pairs judged; null with two coolers."),
  gamesHowellP: nullableNumber.optional(),
  unitsNeeded: z
    .object({ unit: z.enum(['mount', 'run']), units: z.number().int(), runs: z.number().int() })
    .nullable()
    .optional()
    .describe('Fewest per cooler that find the gap that matters as often as the thresholds ask.'),
  outliers: z.array(z.string()).optional().describe('Units and runs that stand out; they stay in.'),
  budget: z
    .object({
      lines: z.array(budgetLineSchema),
      standardUncertainty: z.number(),
      degreesOfFreedom: nullableNumber,
      coverageFactor: z.number(),
      expanded: z.number(),
    })
    .nullable()
    .optional(),
};

/** The gap between two coolers, a's mean minus b's, in the metric's unit. */
export const pairResultSchema = z.object({
  a: z.string(),
  b: z.string(),
  gap: nullableNumber,
  standardError: nullableNumber,
  degreesOfFreedom: nullableNumber,
  statistic: nullableNumber,
  confidence: z.number(),
  interval: z.tuple([z.number(), z.number()]).nullable(),
  marginOfError: nullableNumber,
  p: nullableNumber,
  clearance: nullableNumber.describe('|gap| divided by the margin of error.'),
  smallestVisibleGap: nullableNumber,
  powerAtGapThatMatters: nullableNumber,
  equivalence: z
    .object({ p: z.number(), interval: z.tuple([z.number(), z.number()]), confidence: z.number() })
    .nullable(),
  gapThatMatters: z.number().describe("In the metric's unit."),
  flag: flagSchema,
  sizeCall: sizeCallSchema,
  scope: scopeSchema.nullable(),
  unitOfEvidence: z.enum(['mount', 'run']).nullable(),
  tippingMountSpread: nullableNumber.describe(
    'SD of remounting at which an only-runs gap would stop being outside noise.',
  ),
  naive: naiveResultSchema.nullable(),
  notJudged: z.object({ code: notJudgedCodeSchema, reason: z.string() }).nullable(),
  more: z
    .array(
      z.object({
        mounts: z.number().int().nullable(),
        runs: z.number().int(),
        marginOfError: z.number(),
        clearance: z.number(),
      }),
    )
    .describe(
      'What more evidence per cooler would give if spread and gap stay as measured; first row is now.',
    ),
  leaveOneOut: z
    .object({
      unit: z.enum(['mount', 'run']),
      units: z.number().int(),
      tips: z.number().int(),
      which: z.array(z.string()),
    })
    .nullable()
    .describe('How many single units, left out, would change the flag.'),
  ...furtherPairFields,
});
export type PairResult = z.infer<typeof pairResultSchema>;

export const findingSchema = z.object({
  code: z.string(),
  level: findingLevelSchema,
  title: z.string().describe('Two or three words: Order, Drift, Heat load.'),
  text: z.string().describe('What was seen and its consequence.'),
  numbers: z.record(z.string(), z.number().nullable()),
});
export type Finding = z.infer<typeof findingSchema>;

/** A verdict in words for one pair. `headline` and `ratio` join with a colon: "Outside noise, only just: 1.04× the margin of error". */
export const wordsSchema = z.object({
  headline: z.string(),
  ratio: z.string().nullable(),
  secondLine: z.string(),
  quote: z.string().describe('The sentence that may be published; never stronger than the data.'),
  doesNotCover: z.array(z.string()),
});
export type VerdictWords = z.infer<typeof wordsSchema>;

/** Everything a judgement says. */
export const judgementSchema = z.object({
  method: z.string().describe('Numbered recipe, e.g. welch-mounts/1.'),
  engine: z.string().describe('Engine version.'),
  unit: z.enum(['°C', 'K/W']),
  coolers: z.array(coolerResultSchema),
  pairs: z.array(pairResultSchema),
  words: z.array(wordsSchema).describe('One for each pair, in the same order.'),
  findings: z.array(findingSchema),
  several: z
    .object({
      omnibus: z
        .object({
          statistic: z.number(),
          degreesOfFreedom: z.tuple([z.number(), z.number()]),
          p: z.number(),
        })
        .nullable()
        .describe("Welch's analysis of variance: are all coolers alike?"),
      ranking: z.array(z.string()).describe('Coolers by mean, lowest first.'),
      bars: z.array(z.array(z.string())).describe('Coolers that cannot be told apart; bars may overlap.'),
    })
    .nullable()
    .optional()
    .describe('With three coolers or more.'),
});
export type Judgement = z.infer<typeof judgementSchema>;
