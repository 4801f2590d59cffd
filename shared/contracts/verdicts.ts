import * as z from 'zod';
import {
  digestSchema,
  idSchema,
  instantSchema,
  metricSchema,
  pageOf,
  pageQuerySchema,
  reasonSchema,
} from './common';
import {
  flagSchema,
  judgementInputSchema,
  judgementSchema,
  sizeCallSchema,
  thresholdValuesSchema,
} from './judgement';

/** A verdict's life; a signed-off verdict never changes. */
export const verdictStateSchema = z.enum(['judged', 'submitted', 'sent back', 'signed off', 'withdrawn']);
export type VerdictState = z.infer<typeof verdictStateSchema>;

/** A pair as small as a list needs it, for the small gap rule. */
export const pairRowSchema = z.object({
  a: z.string(),
  b: z.string(),
  gap: z.number().nullable(),
  marginOfError: z.number().nullable(),
  clearance: z.number().nullable(),
  gapThatMatters: z.number(),
  flag: flagSchema,
  sizeCall: sizeCallSchema,
  notJudgedCode: z.string().nullable(),
  headline: z.string(),
});
export type PairRow = z.infer<typeof pairRowSchema>;

export const reRunResultSchema = z.enum(['identical', 'differs', "can't re-run"]);
export type ReRunResult = z.infer<typeof reRunResultSchema>;

export const lastReRunSchema = z.object({ at: instantSchema, by: z.string(), result: reRunResultSchema });

export const verdictRowSchema = z.object({
  id: idSchema,
  study: z.object({ id: idSchema, name: z.string() }),
  condition: z.object({ id: idSchema, name: z.string(), nominalWatts: z.number().nullable() }),
  metric: metricSchema,
  unit: z.enum(['°C', 'K/W']),
  state: verdictStateSchema,
  stateSince: instantSchema,
  preparedBy: z.string(),
  judgedAt: instantSchema,
  thresholdsNumber: z.number().int(),
  method: z.string(),
  pairs: z.array(pairRowSchema),
  cautions: z.number().int(),
  stops: z.number().int(),
  stale: z.boolean().describe('Data or thresholds changed since.'),
  lastReRun: lastReRunSchema.nullable(),
});
export type VerdictRow = z.infer<typeof verdictRowSchema>;

/** One step in a verdict's life, as the ledger has it. */
export const verdictStepSchema = z.object({
  action: z.enum(['judged', 'submitted', 'signed off', 'sent back', 'withdrawn', 're-run']),
  by: z.string(),
  role: z.string(),
  at: instantSchema,
  comment: z.string().nullable(),
});

export const verdictSchema = verdictRowSchema.extend({
  bench: z.object({ id: idSchema, name: z.string() }),
  question: z.string(),
  input: judgementInputSchema,
  judgement: judgementSchema,
  thresholds: z.object({
    number: z.number().int(),
    values: thresholdValuesSchema,
    inForceSince: instantSchema,
    latestNumber: z.number().int(),
  }),
  dataDigest: digestSchema.describe('SHA-256 over the canonical JSON of the input.'),
  logs: z.array(z.object({ runId: idSchema, fileName: z.string(), digest: digestSchema })),
  staleReasons: z.array(z.string()),
  steps: z.array(verdictStepSchema),
  may: z
    .object({
      submit: z.boolean(),
      signOff: z.boolean(),
      sendBack: z.boolean(),
      withdraw: z.boolean(),
      reRun: z.boolean(),
    })
    .describe('What the account asking may do now.'),
  mayNot: z.record(z.string(), z.string()).describe('Why an act is closed to the account asking, by act.'),
});
export type Verdict = z.infer<typeof verdictSchema>;

export const verdictsQuerySchema = pageQuerySchema.extend({
  state: verdictStateSchema.optional(),
  studyId: idSchema.optional(),
});
export const verdictsPageSchema = pageOf(verdictRowSchema);
export type VerdictsPage = z.infer<typeof verdictsPageSchema>;

export const submitRequestSchema = z.object({
  comment: z.string().trim().max(2000).nullable().default(null),
});
export const signOffRequestSchema = submitRequestSchema;
export const sendBackRequestSchema = z.object({ comment: reasonSchema });
export const withdrawRequestSchema = z.object({
  reason: reasonSchema,
  replacedBy: idSchema.nullable().default(null),
});

/** A field that a re-run found different, by its path in the stored result. Values as written, full precision. */
export const differenceSchema = z.object({ path: z.string(), stored: z.string(), reRun: z.string() });

/** What an auditor sees after a re-run from the stored raw bytes. */
export const reRunSchema = z.object({
  verdictId: idSchema,
  result: reRunResultSchema,
  at: instantSchema,
  by: z.string(),
  logsRead: z.number().int(),
  fieldsCompared: z.number().int(),
  differences: z.array(differenceSchema),
  reason: z.string().nullable().describe("Why it can't be re-run."),
  engine: z.object({ stored: z.string(), now: z.string() }),
  method: z.string(),
});
export type ReRun = z.infer<typeof reRunSchema>;
