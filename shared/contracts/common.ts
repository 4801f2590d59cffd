import * as z from 'zod';

/** Identifier of a stored thing. */
export const idSchema = z.uuid();

/** A moment in ISO 8601 with its offset, e.g. `2026-03-12T09:41:00.000Z`. `Date` lives only inside each side. */
export const instantSchema = z.iso.datetime({ offset: true });

/** SHA-256 of some bytes, 64 lower-case hexadecimal digits. */
export const digestSchema = z.string().regex(/^[0-9a-f]{64}$/);

/** A short name typed by a person. */
export const nameSchema = z
  .string()
  .trim()
  .min(1, 'Give a name.')
  .max(120, 'Keep the name under 120 characters.');

/** A reason or comment typed by a person; asked for wherever the record must explain itself. */
export const reasonSchema = z
  .string()
  .trim()
  .min(3, 'Say why, in a few words.')
  .max(2000, 'Keep it under 2000 characters.');

/** Page of a list, as asked for in the query string. */
export const pageQuerySchema = z.object({
  page: z.coerce.number().int().min(1).default(1),
  pageSize: z.coerce.number().int().min(1).max(200).default(50),
});

/** The form of one page of a list of `T`. */
export type PageSchema<T extends z.ZodType> = z.ZodObject<{
  items: z.ZodArray<T>;
  page: z.ZodNumber;
  pageSize: z.ZodNumber;
  total: z.ZodNumber;
}>;

/** One page of a list. */
export const pageOf = <T extends z.ZodType>(item: T): PageSchema<T> =>
  z.object({ items: z.array(item), page: z.number(), pageSize: z.number(), total: z.number() });

/**
 * Problem details (RFC 9457). `code` is for programs, `title` and `detail` for people;
 * `fields` names what was wrong in a form, by path.
 */
export const problemSchema = z.object({
  type: z.string(),
  title: z.string(),
  status: z.number(),
  detail: z.string().optional(),
  code: z.string(),
  fields: z.array(z.object({ path: z.string(), message: z.string() })).optional(),
});

export type Problem = z.infer<typeof problemSchema>;

/** What a judged quantity is: rise in °C or resistance in K/W. */
export const metricSchema = z.enum(['rise', 'resistance']);
export type Metric = z.infer<typeof metricSchema>;

export const roleSchema = z.enum(['analyst', 'lead', 'auditor', 'administrator']);
export type Role = z.infer<typeof roleSchema>;
