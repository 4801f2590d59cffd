import * as z from 'zod';

/** How much a finding weighs: a note changes nothing, a caution weakens the verdict, a stop blocks sign-off. */
export const findingLevelSchema = z.enum(['note', 'caution', 'stop']);
export type FindingLevel = z.infer<typeof findingLevelSchema>;

/** What a column of a log holds. */
export const columnRoleSchema = z.enum(['time', 'heat source', 'ambient', 'watts', 'fan speed']);
export type ColumnRole = z.infer<typeof columnRoleSchema>;

/** Which column of a log plays each part, by zero-based position; `null` where the log has none. */
export const columnMapSchema = z.object({
  time: z.number().int().nullable(),
  heatSource: z.number().int().nullable(),
  ambient: z.number().int().nullable(),
  watts: z.number().int().nullable(),
  fanSpeed: z.number().int().nullable(),
});
export type ColumnMap = z.infer<typeof columnMapSchema>;

/** A column as found in a log, with the part it was recognised to play and why. */
export const foundColumnSchema = z.object({
  position: z.number().int(),
  header: z.string(),
  unit: z.string().nullable(),
  role: columnRoleSchema.nullable(),
  reason: z.string().describe('Why it was recognised so, in words.'),
  firstReading: z.string(),
});
export type FoundColumn = z.infer<typeof foundColumnSchema>;

/** Something wrong with a log, exactly where: rows count from 1 with the header and title lines included. */
export const logProblemSchema = z.object({
  code: z.string(),
  file: z.string(),
  row: z.number().int().nullable(),
  column: z.string().nullable(),
  text: z.string().describe('What was expected and what to do, one or two sentences.'),
});
export type LogProblem = z.infer<typeof logProblemSchema>;

/** A check of one run, with its consequence in words. */
export const runFindingSchema = z.object({
  code: z.string(),
  level: findingLevelSchema,
  text: z.string(),
  atSeconds: z.number().nullable(),
});
export type RunFinding = z.infer<typeof runFindingSchema>;

/** The part of a trace whose mean stands for the run. Times in seconds since the log's start. */
export const steadyWindowSchema = z.object({
  from: z.number(),
  to: z.number(),
  readings: z.number().int(),
  slopePer5Minutes: z.number().describe('Least-squares slope of the rise times 300 s, °C.'),
  settled: z.enum(['settled', 'nearly settled', 'not settled']),
  setBy: z.enum(['rule', 'hand']),
  reason: z.string().nullable().describe('Why a person moved the window; asked for when set by hand.'),
});
export type SteadyWindow = z.infer<typeof steadyWindowSchema>;

/** A mean over the steady window with its spread, in the unit of the quantity. */
export const windowMeanSchema = z.object({
  mean: z.number(),
  standardDeviation: z.number(),
  lowest: z.number(),
  highest: z.number(),
});
export type WindowMean = z.infer<typeof windowMeanSchema>;

/** One run reduced to honest numbers: the only thing about a trace that the judgement sees. */
export const runSummarySchema = z.object({
  rise: z.number().describe('Mean of heat source minus simultaneous ambient, °C.'),
  resistance: z
    .number()
    .nullable()
    .describe('Mean rise divided by mean power of the window, K/W; null without watts.'),
  heatSource: windowMeanSchema.describe('°C'),
  ambient: windowMeanSchema.describe('°C'),
  watts: windowMeanSchema.nullable().describe('W'),
  fanSpeed: windowMeanSchema.nullable().describe('rpm'),
  window: steadyWindowSchema,
  within: z.object({
    standardDeviation: z.number().describe('Of the rise inside the window, °C.'),
    standardError: z
      .number()
      .describe('Of the window mean, autocorrelation allowed for; at least this much, °C.'),
    effectiveReadings: z.number(),
  }),
  sensorStep: z.number().nullable().describe('Smallest step seen in the heat-source reading, °C.'),
  readings: z.number().int(),
  duration: z.number().describe('s'),
  startedAt: z
    .string()
    .nullable()
    .describe('Start as the log tells it, ISO 8601 without offset; null if it has only seconds.'),
  findings: z.array(runFindingSchema),
});
export type RunSummary = z.infer<typeof runSummarySchema>;

/** A trace thinned for drawing: at most some hundred points, seconds and °C. */
export const traceSketchSchema = z.object({
  seconds: z.array(z.number()),
  rise: z.array(z.number().nullable()).describe('null breaks the line where readings are missing'),
  ambient: z.array(z.number().nullable()),
});
export type TraceSketch = z.infer<typeof traceSketchSchema>;

/** What a file's name says about its run: best guesses, each null when the name is silent. */
export const nameGuessSchema = z.object({
  cooler: z.string().nullable(),
  condition: z.string().nullable(),
  mount: z.string().nullable(),
  run: z.string().nullable(),
});
export type NameGuess = z.infer<typeof nameGuessSchema>;
