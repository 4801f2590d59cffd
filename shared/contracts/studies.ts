import * as z from 'zod';
import {
  idSchema,
  instantSchema,
  metricSchema,
  nameSchema,
  pageOf,
  pageQuerySchema,
  reasonSchema,
} from './common';
import {
  foundColumnSchema,
  columnMapSchema,
  logProblemSchema,
  runSummarySchema,
  traceSketchSchema,
} from './run-summary';
import { verdictRowSchema } from './verdicts';

export const conditionSchema = z.object({
  id: idSchema,
  name: z.string(),
  nominalWatts: z.number().positive().nullable(),
});
export type Condition = z.infer<typeof conditionSchema>;

/** A cooler's place in a study: the reference comes last; gaps are compared minus reference. */
export const studyCoolerSchema = z.object({ id: idSchema, name: z.string(), reference: z.boolean() });
export type StudyCooler = z.infer<typeof studyCoolerSchema>;

export const studySchema = z.object({
  id: idSchema,
  name: z.string(),
  question: z.string(),
  bench: z.object({ id: idSchema, name: z.string() }),
  coolers: z.array(studyCoolerSchema),
  conditions: z.array(conditionSchema),
  preparedBy: z.string(),
  madeAt: instantSchema,
  runs: z.number().int(),
  runsLeftOut: z.number().int(),
  verdicts: z.array(verdictRowSchema).describe('Newest first.'),
});
export type Study = z.infer<typeof studySchema>;

/** A study in the list, with the newest verdict of each condition (rise). */
export const studyRowSchema = studySchema.omit({ runsLeftOut: true });
export type StudyRow = z.infer<typeof studyRowSchema>;

export const studiesQuerySchema = pageQuerySchema.extend({
  search: z.string().trim().max(120).default(''),
  sort: z.enum(['newest', 'name']).default('newest'),
});
export const studiesPageSchema = pageOf(studyRowSchema);
export type StudiesPage = z.infer<typeof studiesPageSchema>;

export const addStudyRequestSchema = z.object({
  name: nameSchema,
  question: z.string().trim().max(1000).default(''),
  benchId: idSchema,
  compared: z
    .array(nameSchema)
    .min(1, 'Name the cooler to compare.')
    .max(12)
    .describe('Names of coolers; new names are added to the team.'),
  reference: nameSchema,
  conditions: z
    .array(
      z.object({
        name: nameSchema,
        nominalWatts: z.number().positive('Watts are above zero.').max(5000).nullable(),
      }),
    )
    .min(1, 'Name at least one condition, such as the load.')
    .max(12),
});
export type AddStudyRequest = z.infer<typeof addStudyRequestSchema>;

/** A stored run. */
export const runSchema = z.object({
  id: idSchema,
  coolerId: idSchema,
  conditionId: idSchema,
  mount: z.string().nullable().describe('Name of the mount; null when mounts were not recorded.'),
  name: z.string().describe('Name of the run inside its mount.'),
  order: z.number().int().nullable(),
  fileName: z.string(),
  digest: z.string(),
  bytes: z.number().int(),
  columns: z.array(foundColumnSchema),
  columnMap: columnMapSchema,
  summary: runSummarySchema,
  sketch: traceSketchSchema,
  leftOut: z.object({ reason: z.string(), by: z.string(), at: instantSchema }).nullable(),
  broughtInBy: z.string(),
  broughtInAt: instantSchema,
});
export type Run = z.infer<typeof runSchema>;
export const runsSchema = z.object({ runs: z.array(runSchema) });

/** How a file of a drop is to be stored. One entry a file, found again by its name and digest. */
export const runAssignmentSchema = z.object({
  fileName: z.string().min(1).max(255),
  digest: z.string().regex(/^[0-9a-f]{64}$/),
  coolerId: idSchema,
  conditionId: idSchema,
  mount: nameSchema.nullable(),
  run: nameSchema,
  order: z.number().int().min(1).nullable(),
  columnMap: columnMapSchema.nullable().describe('null: as recognised.'),
  fixedAmbient: z
    .number()
    .min(-50)
    .max(100)
    .nullable()
    .default(null)
    .describe('°C, for a log without an ambient column.'),
  window: z
    .object({ from: z.number(), to: z.number(), reason: reasonSchema })
    .nullable()
    .describe('Set by hand; null: the rule decides.'),
});
export type RunAssignment = z.infer<typeof runAssignmentSchema>;

/** The `assignments` field of the multipart upload, as JSON. */
export const runAssignmentsSchema = z.array(runAssignmentSchema).min(1).max(200);

/** What became of one file. One bad file spoils no other. */
export const intakeOutcomeSchema = z.discriminatedUnion('outcome', [
  z.object({ outcome: z.literal('stored'), fileName: z.string(), run: runSchema }),
  z.object({ outcome: z.literal('already stored'), fileName: z.string(), runId: idSchema, text: z.string() }),
  z.object({
    outcome: z.literal('refused'),
    fileName: z.string(),
    problems: z.array(logProblemSchema).min(1),
  }),
]);
export type IntakeOutcome = z.infer<typeof intakeOutcomeSchema>;
export const intakeResultSchema = z.object({ outcomes: z.array(intakeOutcomeSchema) });
export type IntakeResult = z.infer<typeof intakeResultSchema>;

/** Changes to several stored runs at once; an omitted field stays as it is. */
export const changeRunsRequestSchema = z.object({
  runIds: z.array(idSchema).min(1).max(500),
  coolerId: idSchema.optional(),
  conditionId: idSchema.optional(),
  mount: nameSchema.nullable().optional(),
  leaveOut: z.object({ reason: reasonSchema }).nullable().optional().describe('null puts the runs back in.'),
});
export type ChangeRunsRequest = z.infer<typeof changeRunsRequestSchema>;

export const judgeRequestSchema = z.object({ conditionId: idSchema, metric: metricSchema });
export type JudgeRequest = z.infer<typeof judgeRequestSchema>;
