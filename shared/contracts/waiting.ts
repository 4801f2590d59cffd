import * as z from 'zod';
import { idSchema, instantSchema, roleSchema } from './common';
import { verdictRowSchema } from './verdicts';

/** What waits for a person: a verdict to act on, or a study without a verdict. */
export const waitingItemSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('verdict'), verdict: verdictRowSchema, comment: z.string().nullable() }),
  z.object({
    kind: z.literal('study'),
    study: z.object({ id: idSchema, name: z.string(), coolers: z.array(z.string()), bench: z.string() }),
    runs: z.number().int(),
    since: instantSchema,
    why: z.string(),
  }),
  z.object({
    kind: z.literal('person'),
    person: z.object({ id: idSchema, name: z.string() }),
    since: instantSchema,
    why: z.string(),
  }),
]);
export type WaitingItem = z.infer<typeof waitingItemSchema>;

export const waitingGroupSchema = z.object({
  code: z.enum([
    'to sign',
    'sent back',
    'to submit',
    'needs runs',
    'differs',
    'not re-run',
    'invited',
    'moving',
  ]),
  needsMe: z.boolean(),
  items: z.array(waitingItemSchema),
});
export type WaitingGroup = z.infer<typeof waitingGroupSchema>;

export const waitingSchema = z.object({
  roles: z.array(
    z.object({ role: roleSchema, count: z.number().int(), groups: z.array(waitingGroupSchema) }),
  ),
});
export type Waiting = z.infer<typeof waitingSchema>;
