import * as z from 'zod';
import { idSchema, instantSchema, nameSchema } from './common';

export const benchSchema = z.object({
  id: idSchema,
  name: z.string(),
  place: z.string(),
  heatSource: z.string().describe('What stands for the processor, in words.'),
  notes: z.string(),
  addedAt: instantSchema,
});
export type Bench = z.infer<typeof benchSchema>;
export const benchesSchema = z.object({ benches: z.array(benchSchema) });

export const addBenchRequestSchema = z.object({
  name: nameSchema,
  place: z.string().trim().max(200).default(''),
  heatSource: z.string().trim().max(200).default(''),
  notes: z.string().trim().max(2000).default(''),
});
export type AddBenchRequest = z.infer<typeof addBenchRequestSchema>;

/** Spread seen on a bench in one stored verdict, °C of rise. */
export const benchSpreadSchema = z.object({
  verdictId: idSchema,
  study: z.string(),
  condition: z.string(),
  judgedAt: instantSchema,
  spreadBetweenRuns: z.number().nullable(),
  spreadBetweenMounts: z.number().nullable(),
  smallestVisibleGap: z.number().nullable(),
});

/** What a bench can tell apart, learnt from the newest verdict on each study and condition run on it (rise only). */
export const benchNoiseSchema = z.object({
  bench: benchSchema,
  spreads: z.array(benchSpreadSchema),
  pooled: z
    .object({
      spreadBetweenRuns: z.number().nullable(),
      runDegreesOfFreedom: z.number(),
      spreadOfMountMeans: z.number().nullable(),
      mountDegreesOfFreedom: z.number(),
    })
    .describe('Pooled over studies, °C.'),
  visible: z
    .array(z.object({ mounts: z.number().int(), runs: z.number().int(), gap: z.number() }))
    .describe(
      "Smallest gap this bench can see by mounts per cooler, at the thresholds' confidence and power, °C.",
    ),
  confidence: z.number(),
  power: z.number(),
  gapThatMatters: z.number(),
});
export type BenchNoise = z.infer<typeof benchNoiseSchema>;

export const coolerSchema = z.object({ id: idSchema, name: z.string(), notes: z.string() });
export type Cooler = z.infer<typeof coolerSchema>;
export const coolersSchema = z.object({ coolers: z.array(coolerSchema) });
export const addCoolerRequestSchema = z.object({
  name: nameSchema,
  notes: z.string().trim().max(2000).default(''),
});
export type AddCoolerRequest = z.infer<typeof addCoolerRequestSchema>;
