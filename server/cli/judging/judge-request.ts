import * as z from 'zod';
import { metricSchema } from '../../../shared/contracts/common';

const positive = z.number().positive();
const share = z.number().gt(0.5).lt(1);

/** A run of a request: a value already reduced, or a log to be read. */
const runSchema = z
  .strictObject({
    name: z.string().optional(),
    value: z.number().optional(),
    file: z.string().min(1).optional(),
    order: z.number().int().min(1).optional(),
    watts: positive.optional(),
    ambient: z.number().optional(),
    fanSpeed: positive.optional(),
  })
  .refine((run) => (run.value === undefined) !== (run.file === undefined), {
    message: 'expected either "value" or "file"',
  });
export type RequestedRun = z.infer<typeof runSchema>;

const coolerSchema = z
  .strictObject({
    name: z.string().min(1),
    mounts: z
      .array(z.strictObject({ name: z.string().min(1).optional(), runs: z.array(runSchema).min(1) }))
      .min(1)
      .optional(),
    runs: z.array(runSchema).min(1).optional(),
  })
  .refine((cooler) => (cooler.mounts === undefined) !== (cooler.runs === undefined), {
    message: 'expected either "mounts" or "runs"',
  });

/** What `npm run judge` is asked. `runs` directly under a cooler: its mounts were not recorded. */
const judgeRequestSchema = z.strictObject({
  metric: metricSchema.default('rise'),
  thresholds: z
    .strictObject({
      confidence: share.default(0.95),
      power: share.default(0.8),
      gapThatMatters: positive.default(1),
    })
    .default({ confidence: 0.95, power: 0.8, gapThatMatters: 1 }),
  bench: z.strictObject({ mountSpread: positive, mountSpreadDegreesOfFreedom: positive }).optional(),
  nominalWatts: positive.optional(),
  seed: z.number().int().default(1),
  coolers: z.array(coolerSchema).min(2),
});
export type JudgeRequest = z.infer<typeof judgeRequestSchema>;

/** Something the caller can mend; one line, naming where. */
export class BadRequest extends Error {}

/** A path as people write it: `coolers[0].mounts[1].runs[2].value`. */
const inWords = (path: readonly PropertyKey[]): string =>
  path
    .map((part) => (typeof part === 'number' ? `[${part}]` : `.${String(part)}`))
    .join('')
    .replace(/^\./, '');

/**
 * Parses a request's text.
 * @param name what to call the text in a message: the file's name, or "standard input"
 * @throws BadRequest naming the file, and row and column of broken JSON or the path of a wrong value
 */
export function parseRequest(text: string, name: string): JudgeRequest {
  let json: unknown;
  try {
    json = JSON.parse(text.replace(/^\uFEFF/, ''));
  } catch (error) {
    throw new BadRequest(`${name}: ${whereBroken(text, error)}`);
  }
  const parsed = judgeRequestSchema.safeParse(json);
  if (!parsed.success) {
    const [issue] = parsed.error.issues;
    const at = inWords(issue.path);
    const message = issue.message.charAt(0).toLowerCase() + issue.message.slice(1);
    throw new BadRequest(`${name}: ${at ? `${at}: ` : ''}${message}`);
  }
  const names = parsed.data.coolers.map((cooler) => cooler.name);
  const twice = names.find((one, index) => names.indexOf(one) !== index);
  if (twice !== undefined)
    throw new BadRequest(`${name}: coolers: two coolers are named "${twice}"; give each its own name`);
  return parsed.data;
}

/** Where JSON breaks, as row and column from 1. */
function whereBroken(text: string, error: unknown): string {
  const message = error instanceof Error ? error.message : String(error);
  const position = /position (\d+)/.exec(message);
  const upTo = position ? text.slice(0, Number(position[1])) : text;
  const row = upTo.split('\n').length;
  const column = upTo.length - upTo.lastIndexOf('\n');
  return `row ${row}, column ${column}: not JSON (${message.replace(/\s+/g, ' ')})`;
}
