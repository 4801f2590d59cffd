import * as z from 'zod';

/** First message of a failed parse for each field, by dotted path: the same words the server would answer with. */
export function contractErrors(parsed: z.ZodSafeParseResult<unknown>): Record<string, string> {
  if (parsed.success) return {};
  const errors: Record<string, string> = {};
  for (const issue of parsed.error.issues) errors[issue.path.join('.')] ??= issue.message;
  return errors;
}

export const fieldError = (errors: Readonly<Record<string, string>>, field: string): string | null =>
  errors[field] ?? null;
