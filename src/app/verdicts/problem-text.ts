import { HttpErrorResponse } from '@angular/common/http';
import { problemSchema } from '../../../shared/contracts';

/** What to tell a person when an act did not go through: the server's own words, or what happened instead. */
export function problemText(error: unknown): string {
  if (error instanceof HttpErrorResponse) {
    const problem = problemSchema.safeParse(error.error);
    if (problem.success) {
      const { title, detail, fields } = problem.data;
      return [detail ?? `${title}.`, ...(fields ?? []).map(({ message }) => message)].join(' ');
    }
    return error.status === 0
      ? 'The server did not answer. Nothing was changed. Try again.'
      : `The server answered ${error.status} without saying why. Nothing is known to have changed; reload to see.`;
  }
  return 'The server’s answer was not in the agreed form. Reload the page; if it stays, tell the administrator.';
}
