import * as z from 'zod';
import { idSchema, instantSchema, pageOf } from './common';

/**
 * One entry of a team's chained record. `digest` covers the canonical JSON (RFC 8785) of the entry and `previous`.
 * Digests are shown as stored, whatever they have become: tampering is to be seen, not to hide the ledger.
 */
export const ledgerEntrySchema = z.object({
  id: idSchema,
  number: z.number().int(),
  at: instantSchema,
  by: z.string(),
  role: z.string(),
  action: z.string(),
  subject: z.object({ kind: z.string(), id: idSchema, name: z.string() }),
  content: z.record(z.string(), z.unknown()),
  previous: z.string().nullable(),
  digest: z.string(),
});
export type LedgerEntry = z.infer<typeof ledgerEntrySchema>;
export const ledgerPageSchema = pageOf(ledgerEntrySchema);
export type LedgerPage = z.infer<typeof ledgerPageSchema>;

export const ledgerCheckSchema = z.object({
  entries: z.number().int(),
  whole: z.boolean(),
  brokenAt: z.number().int().nullable(),
  latestDigest: z.string().nullable(),
  checkedAt: instantSchema,
});
export type LedgerCheck = z.infer<typeof ledgerCheckSchema>;
