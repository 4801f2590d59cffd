import * as z from 'zod';
import { idSchema, instantSchema, reasonSchema } from './common';
import { thresholdValuesSchema } from './judgement';

/** One set of acceptance thresholds. Sets are numbered in the team and never change; the newest is in force. */
export const thresholdsVersionSchema = z.object({
  id: idSchema,
  number: z.number().int(),
  values: thresholdValuesSchema,
  reason: z.string(),
  madeBy: z.string(),
  inForceSince: instantSchema,
});
export type ThresholdsVersion = z.infer<typeof thresholdsVersionSchema>;

export const thresholdsHistorySchema = z.object({
  current: thresholdsVersionSchema,
  versions: z.array(thresholdsVersionSchema),
});
export type ThresholdsHistory = z.infer<typeof thresholdsHistorySchema>;

export const changeThresholdsRequestSchema = z.object({
  basedOn: z
    .number()
    .int()
    .describe('Number of the set the person was looking at; refused when another came in between.'),
  values: thresholdValuesSchema,
  reason: reasonSchema,
});
export type ChangeThresholdsRequest = z.infer<typeof changeThresholdsRequestSchema>;
